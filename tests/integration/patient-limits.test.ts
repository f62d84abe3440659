import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { recordSession } from '$lib/server/bedside/actions';
import { listSessions } from '$lib/server/bedside/queries';
import { db } from '$lib/server/db';
import { audit, findings } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { endPatientLimit, setPatientLimit } from '$lib/server/limits/patient-actions';
import { patientLimitsOf } from '$lib/server/limits/queries';
import { changeUnitLimit } from '$lib/server/limits/unit-actions';
import { getThread } from '$lib/server/threads/queries';
import { addReferral, addWard, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionFalling } from '../support/session-falling';

const hospital = await openHospital();
let unitId: string;
let episodeId: string;

const AGREED = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-03-01' };
const FALL = { set: 'strict', key: 'systolic-fall', value: 15, ...AGREED } as const;
const OWN = { key: 'systolic-fall', value: 6, reason: 'Tight left main.', untilOn: '2026-03-05' } as const;

beforeEach(async () => {
	({ unitId, episodeId } = await addWard(hospital));
});

const as = (role: keyof Hospital['people'], minutes = 0) =>
	contextOf(hospital.people[role], hospital.now + minutes * 60_000);

const session = (fall: number, minutes = 10) => sessionFalling(fall, hospital.now + minutes * 60_000);
async function judged(fall: number, minutes = 10) {
	const { result } = await recordSession(as('therapist', minutes), episodeId, session(fall, minutes));
	return result.findings.filter(({ rule }) => rule === 'systolic-fall');
}

describe('a limit of a patient', () => {
	it.each(['physician', 'surgeon'] as const)('is set by a %s, over that of the unit', async (role) => {
		await changeUnitLimit(as('admin'), unitId, FALL);
		await setPatientLimit(as(role, 1), episodeId, OWN);
		expect(await judged(7)).toMatchObject([{ grade: 'stop', limit: 6, version: 'patient 1' }]);
		const [kept] = await listSessions(db(), hospital.people.nurse, episodeId);
		expect(kept?.limitVersion).toBe('strict/2+unit 1+patient 1');
		const rows = await db()
			.select()
			.from(findings)
			.where(eq(findings.sessionId, kept?.id ?? ''));
		expect(rows.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({
			set: 'strict',
			version: 'patient 1',
			limit: 6
		});
	});

	it('holds to the end of its last day, in the zone of the hospital', async () => {
		await setPatientLimit(as('physician'), episodeId, OWN);
		const held = async (at: string) =>
			(await getNameboard(db(), hospital.people.nurse, episodeId, Date.parse(at))).limits.patient.length;
		expect([await held('2026-03-05T23:59:59Z'), await held('2026-03-06T00:00:00Z')]).toEqual([1, 0]);
	});

	it('is ended before its day, once, and stays in the history', async () => {
		const { result } = await setPatientLimit(as('physician'), episodeId, OWN);
		await endPatientLimit(as('surgeon', 5), result.id);
		await expect(endPatientLimit(as('surgeon', 6), result.id)).rejects.toMatchObject({ code: 'wrong-state' });
		expect(await judged(7)).toEqual([]);
		const lines = await patientLimitsOf(db(), hospital.people.nurse, episodeId, hospital.now + 10 * 60_000);
		expect(lines).toMatchObject([
			{ value: 6, reason: OWN.reason, inForce: false, endedBy: hospital.people.surgeon.name }
		]);
	});

	it('gives way to a newer one of the same name', async () => {
		await setPatientLimit(as('physician'), episodeId, OWN);
		await setPatientLimit(as('physician', 1), episodeId, { ...OWN, value: 8 });
		const lines = await patientLimitsOf(db(), hospital.people.nurse, episodeId, hospital.now + 60_000);
		expect(lines.map(({ version, value, inForce }) => [version, value, inForce])).toEqual([
			[2, 8, true],
			[1, 6, false]
		]);
		expect(await judged(7)).toMatchObject([{ grade: 'caution', limit: 8, version: 'patient 2' }]);
	});

	it('that lapsed by its own day was ended by nobody when a newer one comes', async () => {
		await setPatientLimit(as('physician'), episodeId, { ...OWN, untilOn: '2026-03-03' });
		const tomorrow = hospital.now + 24 * 60 * 60_000;
		await setPatientLimit(contextOf(hospital.people.physician, tomorrow), episodeId, { ...OWN, value: 8 });
		const lines = await patientLimitsOf(db(), hospital.people.nurse, episodeId, tomorrow);
		expect(lines.map(({ value, inForce, endedBy }) => [value, inForce, endedBy])).toEqual([
			[8, true, null],
			[6, false, null]
		]);
	});

	it('holds on, or ends sooner, by the same number with another last day', async () => {
		await setPatientLimit(as('physician'), episodeId, OWN);
		await setPatientLimit(as('physician', 1), episodeId, { ...OWN, untilOn: '2026-03-09' });
		await setPatientLimit(as('surgeon', 2), episodeId, { ...OWN, untilOn: '2026-03-04' });
		const lines = await patientLimitsOf(db(), hospital.people.nurse, episodeId, hospital.now + 5 * 60_000);
		expect(lines.map(({ value, untilOn, inForce }) => [value, untilOn, inForce])).toEqual([
			[6, '2026-03-04', true],
			[6, '2026-03-09', false],
			[6, '2026-03-05', false]
		]);
		const again = setPatientLimit(as('physician', 3), episodeId, { ...OWN, untilOn: '2026-03-04' });
		await expect(again).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/value' }] }
		});
	});

	it('that was overruled does not come back when the newer one ends', async () => {
		await setPatientLimit(as('physician'), episodeId, { ...OWN, value: 30 });
		const { result } = await setPatientLimit(as('physician', 1), episodeId, { ...OWN, value: 8 });
		await endPatientLimit(as('surgeon', 2), result.id);
		const lines = await patientLimitsOf(db(), hospital.people.nurse, episodeId, hospital.now + 5 * 60_000);
		expect(lines.map(({ value, inForce }) => [value, inForce])).toEqual([
			[8, false],
			[30, false]
		]);
		// The default of the strict set, API.md: a fall over 10 stops.
		expect(await judged(11)).toMatchObject([{ grade: 'stop', limit: 10 }]);
	});

	it('is told in the thread, and audited without its reason', async () => {
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		await setPatientLimit(as('physician'), episodeId, OWN);
		const page = { limit: 50, after: null };
		const { items } = await getThread(db(), hospital.people.nurse, threadId, page);
		expect(items.map(({ kind, body }) => [kind, body])).toEqual([
			[
				'event',
				'Fall of the systolic pressure (Stop, mmHg): for this patient 6 in place of 10, to the end of Thursday 5 March 2026. Tight left main.'
			]
		]);
		const rows = await db().select().from(audit).where(eq(audit.episodeId, episodeId));
		expect(JSON.stringify(rows)).not.toContain('left main');
		expect(rows.map(({ action }) => action)).toContain('limit.set-for-patient');
	});

	it.each([
		['a day that is past', { ...OWN, untilOn: '2026-03-02' }, '/untilOn'],
		['more than ninety days', { ...OWN, untilOn: '2026-06-02' }, '/untilOn'],
		['out of range', { ...OWN, value: 1 }, '/value'],
		['what holds already', { ...OWN, value: 10 }, '/value']
	])('is refused: %s', async (_what, input, pointer) => {
		const refused = setPatientLimit(as('physician'), episodeId, input);
		await expect(refused).rejects.toMatchObject({ code: 'invalid', extra: { errors: [{ pointer }] } });
	});

	it.each(['2026-03-03', '2026-06-01'])('may last until %s', async (untilOn) => {
		await expect(setPatientLimit(as('physician'), episodeId, { ...OWN, untilOn })).resolves.toBeDefined();
	});

	it.each(['nurse', 'therapist', 'speech-therapist', 'coordinator', 'admin'] as const)(
		'is not set by a %s',
		async (role) => {
			await expect(setPatientLimit(as(role), episodeId, OWN)).rejects.toMatchObject({ code: 'not-allowed' });
		}
	);

	it('does not exist for somebody of another unit', async () => {
		const { result } = await setPatientLimit(as('physician'), episodeId, OWN);
		const outside = contextOf(hospital.outsider);
		await expect(setPatientLimit(outside, episodeId, OWN)).rejects.toMatchObject({ code: 'not-found' });
		await expect(endPatientLimit(outside, result.id)).rejects.toMatchObject({ code: 'not-found' });
		await expect(patientLimitsOf(db(), hospital.outsider, episodeId, hospital.now)).rejects.toMatchObject({
			code: 'not-found'
		});
	});
});
