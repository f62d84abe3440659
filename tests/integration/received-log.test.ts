import { beforeEach, describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { inboundMessages } from '$lib/server/db/schema';
import { forgetOldWords } from '$lib/server/messages/forget';
import { listReceived } from '$lib/server/messages/received';
import { settleInbound } from '$lib/server/messages/settle';
import { callHook, signedPost } from '../support/hook-server';
import { contextOf, HOSPITAL_NOW, newPhone } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

/** What came in, for the administrator: from whom, what it did, and no words that may be about a patient. */

const PUBLIC_URL = 'https://ropewalk.saltmarsh.example';
const DAY = 24 * 60 * 60_000;
const hospital = await openHospital({ PUBLIC_URL });
const admin = contextOf(hospital.people.admin);
let count = 0;

beforeEach(() => db().delete(inboundMessages));

async function text(From: string, Body: string, at = HOSPITAL_NOW): Promise<void> {
	count += 1;
	const fields = { From, Body, MessageSid: `SM${String(count).padStart(32, '0')}` };
	expect((await callHook(signedPost(PUBLIC_URL, '/api/hooks/sms', fields), at)).status).toBe(200);
}

const lines = async (limit = 50, after: string | null = null) => listReceived(admin, { limit, after });

describe('what came in', () => {
	it.each(ROLES.filter((role) => role !== 'admin'))('is not for a %s', async (role) => {
		const asked = listReceived(contextOf(hospital.people[role]), { limit: 1, after: null });
		await expect(asked).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('of a patient names no patient, and keeps back what may be about how they are', async () => {
		const { phone, name } = hospital.patient;
		await text(phone, 'My wound is wet, what now?');
		await text(phone, 'HELP', HOSPITAL_NOW + 1_000);
		const { items } = await lines();
		const from = { kind: 'patient', number: phone.slice(-4) };
		expect(items).toMatchObject([
			{ from, understoodAs: 'help', words: 'HELP', wordsAre: 'shown', waits: false, handled: null },
			{ from, understoodAs: 'other', words: null, wordsAre: 'private', waits: true, handled: null }
		]);
		expect(JSON.stringify(items)).not.toContain('wound');
		expect(JSON.stringify(items)).not.toContain(name);
	});

	it('says who saw to it, and not what they noted', async () => {
		await text(hospital.patient.phone, 'My wound is wet, what now?');
		const [line] = (await lines()).items;
		await settleInbound(contextOf(hospital.people.coordinator), line?.id ?? '', { note: 'Rang her.' });
		const [after] = (await lines()).items;
		expect(after).toMatchObject({ waits: false, handled: { by: hospital.people.coordinator.name } });
		expect(JSON.stringify(after)).not.toContain('Rang');
	});

	it('of a number that is nobody’s tells its end alone', async () => {
		const phone = newPhone();
		await text(phone, 'Is this the hospital?');
		expect((await lines()).items).toMatchObject([
			{ from: { kind: 'nobody', number: phone.slice(-4) }, understoodAs: 'unknown-number', waits: true }
		]);
	});

	it('loses its words with their time, and stays', async () => {
		await text(hospital.patient.phone, 'HELP');
		await forgetOldWords(HOSPITAL_NOW + 366 * DAY);
		expect((await lines()).items).toMatchObject([{ understoodAs: 'help', words: null, wordsAre: 'removed' }]);
	});

	it('comes in pages, the newest first', async () => {
		for (let n = 0; n < 3; n += 1) {
			await text(hospital.patient.phone, 'HELP', HOSPITAL_NOW + n * 1_000);
		}
		const first = await lines(2);
		const rest = await lines(2, first.next);
		expect([first.items.length, rest.items.length, rest.next]).toEqual([2, 1, null]);
		expect(new Set([...first.items, ...rest.items].map(({ id }) => id)).size).toBe(3);
	});
});
