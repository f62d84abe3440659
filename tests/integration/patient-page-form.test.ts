import { beforeEach, describe, expect, it } from 'vitest';
import type { Context } from '$lib/server/context';
import { linkToken } from '$lib/server/links';
import { sendPage } from '$lib/server/patient-page/share';
import { bookVisits } from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { actions } from '../../src/routes/(patient)/p/[token]/+page.server';
import { addPatient, contextOf, HOSPITAL_NOW } from '../support/hospital';
import { DAY_MS } from '../support/lengths';
import { openHospital } from '../support/open-hospital';

/** What a refused answer leaves on the patient's page: the visit, and what was written about it. */

const hospital = await openHospital({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
const coordinator = () => contextOf(hospital.people.coordinator);
const holder: Context = { actor: null, now: HOSPITAL_NOW, address: '127.0.0.1', key: null };
const WHY = 'No bus that day.';

let visit: string;
let token: string;
let days = 5;

beforeEach(async () => {
	const { episodeId } = await addPatient({ unitId: hospital.units.gym });
	days += 1;
	const startsAt = HOSPITAL_NOW + days * DAY_MS;
	const input = { kind: 'single', startsAt, minutes: 45, place: 'East Gym' } as const;
	visit = (await bookVisits(coordinator(), episodeId, input)).result.items[0]?.id ?? '';
	token = linkToken((await sendPage(coordinator(), episodeId, 'sms')).result.id);
});

/** What the form's action answers; throws what leads elsewhere. */
function post(fields: Record<string, string>) {
	const url = new URL(`http://127.0.0.1:3000/p/${token}`);
	const body = new URLSearchParams({ visit, sequence: '0', deed: 'decline', ...fields });
	const request = new Request(url, { method: 'POST', body });
	const event = { locals: { context: holder }, params: { token }, request, url };
	return actions.default?.(event as unknown as Parameters<NonNullable<typeof actions.default>>[0]);
}

describe('an answer that is refused', () => {
	it('because the visit has moved keeps what was written, and the visit open', async () => {
		days += 1;
		await rescheduleVisit(coordinator(), visit, { startsAt: HOSPITAL_NOW + days * DAY_MS });
		expect(await post({ why: WHY })).toMatchObject({
			status: 409,
			data: { refused: 'wrong-state', visit, why: WHY }
		});
	});

	it.each([
		[200, null],
		[201, 422]
	])('because %d characters were written: %s', async (length, status) => {
		const why = 'a'.repeat(length);
		const answer = await Promise.resolve(post({ why })).catch(() => null);
		expect(answer?.status ?? null).toBe(status);
		if (answer) {
			expect(answer.data).toEqual({ refused: 'invalid', visit, why });
		}
	});
});
