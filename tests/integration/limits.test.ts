import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { sessionBody } from '$lib/domain/bedside/forms';
import { ROLES } from '$lib/domain/core/codes';
import { recordSession } from '$lib/server/bedside/actions';
import { listSessions } from '$lib/server/bedside/queries';
import { db } from '$lib/server/db';
import { audit, findings } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { newId } from '$lib/server/ids';
import { endPatientLimit, setPatientLimit } from '$lib/server/limits/patient-actions';
import { patientLimitsOf, unitLimitsOf } from '$lib/server/limits/queries';
import { changeUnitLimit, chooseUnitSet } from '$lib/server/limits/unit-actions';
import { listen, type LoggedEvent } from '$lib/server/live/hub';
import { getThread } from '$lib/server/threads/queries';
import { addReferral, addWard, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let unitId: string;
let episodeId: string;

const TODAY = '2026-03-03';
const AGREED = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-03-01' };
const FALL = { set: 'strict', key: 'systolic-fall', value: 15, ...AGREED } as const;
const OWN = { key: 'systolic-fall', value: 6, reason: 'Tight left main.', untilOn: '2026-03-05' } as const;

beforeEach(async () => {
	({ unitId, episodeId } = await addWard(hospital));
});

const as = (role: keyof Hospital['people'], minutes = 0) =>
	contextOf(hospital.people[role], hospital.now + minutes * 60_000);
const thing = (set: string, key: string | null, value: number | null) => ({ set, key, value });

/** A session whose systolic pressure falls by `fall` from 130 mmHg. */
function session(fall: number, minutes = 10) {
	const at = (offset: number) => new Date(hospital.now + (minutes + offset) * 60_000).toISOString();
	const calm = { hr: 78, dbp: 72, spo2: 97, rr: 16, pain: 1 };
	return sessionBody.parse({
		context: { betaBlocked: false, rhythm: 'sinus', sternotomy: true, level: 2, conscious: true },
		before: { ...calm, sbp: 130 },
		during: [],
		after: { ...calm, sbp: 130 - fall },
		level: 2,
		startedAt: at(-10),
		endedAt: at(0)
	});
}
async function judged(fall: number, minutes = 10) {
	const { result } = await recordSession(as('therapist', minutes), episodeId, session(fall, minutes));
	return result.findings.filter(({ rule }) => rule === 'systolic-fall');
}

describe('a limit of a unit', () => {
	it('is numbered, keeps who answers for it, and is on record', async () => {
		const { result } = await changeUnitLimit(as('admin'), unitId, FALL);
		expect(result.version).toBe(1);
		await changeUnitLimit(as('admin', 1), unitId, { ...FALL, value: null });
		const { changes } = await unitLimitsOf(db(), unitId);
		expect(
			changes.map(({ version, value, agreedBy, agreedOn }) => [version, value, agreedBy, agreedOn])
		).toEqual([
			[2, null, 'Maeve Tidewell', '2026-03-01'],
			[1, 15, 'Maeve Tidewell', '2026-03-01']
		]);
		expect(changes.map(({ changedBy }) => changedBy)).toEqual(Array(2).fill(hospital.people.admin.name));
		const rows = await db().select().from(audit).where(eq(audit.objectId, unitId));
		expect(rows.map(({ action, detail }) => [action, detail])).toEqual([
			['unit.limit-changed', { set: 'strict', key: 'systolic-fall', value: 15, was: 10, version: 1 }],
			['unit.limit-changed', { set: 'strict', key: 'systolic-fall', value: null, was: 15, version: 2 }]
		]);
	});

	it('judges the sessions recorded after it, and not those before', async () => {
		expect(await judged(12)).toMatchObject([{ grade: 'stop', limit: 10, set: 'strict', version: '2' }]);
		await changeUnitLimit(as('admin', 20), unitId, FALL);
		expect(await judged(12, 30)).toMatchObject([{ grade: 'caution', limit: 15, version: 'unit 1' }]);
		// Entered afterwards: what held then judges it.
		const late = await recordSession(as('therapist', 40), episodeId, session(12, 15));
		expect(late.result.findings.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({ limit: 10 });
	});

	it('is heard of by whoever has a patient of the unit open', async () => {
		const heard: LoggedEvent[] = [];
		const stop = listen((event) => heard.push(event));
		await changeUnitLimit(as('admin'), unitId, FALL);
		stop();
		expect(heard).toMatchObject([{ topic: 'episode', kind: 'limits-changed', episodeId, unitId }]);
	});

	it.each([
		['out of range', { ...FALL, value: 61 }, 'value is 61: systolic-fall must be a number from 2 to 60.'],
		['what holds already', { ...FALL, value: 10 }, 'value is 10: that is what systolic-fall is already.'],
		[
			'the default again',
			{ ...FALL, value: null },
			'value is the default: that is what systolic-fall is already.'
		],
		[
			'a day to come',
			{ ...FALL, agreedOn: '2026-03-04' },
			`agreedOn is 2026-03-04: it must not lie after today, ${TODAY}.`
		]
	])('is refused: %s', async (_what, input, message) => {
		const refused = changeUnitLimit(as('admin'), unitId, input);
		await expect(refused).rejects.toMatchObject({ code: 'invalid', extra: { errors: [{ message }] } });
		expect((await unitLimitsOf(db(), unitId)).changes).toEqual([]);
	});

	it.each(ROLES.filter((role) => role !== 'admin'))('is not changed by a %s', async (role) => {
		await expect(changeUnitLimit(as(role), unitId, FALL)).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('of a unit that is not there is not found', async () => {
		await expect(changeUnitLimit(as('admin'), newId(), FALL)).rejects.toMatchObject({ code: 'not-found' });
	});

	it('cannot be changed behind the record’s back', async () => {
		await changeUnitLimit(as('admin'), unitId, FALL);
		await expect(db().run('update unit_limit_changes set value = 1')).rejects.toThrow();
	});
});

describe('the set of a unit', () => {
	it('judges its inpatients, unless a session names another', async () => {
		await chooseUnitSet(as('admin'), unitId, { set: 'guideline', ...AGREED });
		const { result } = await recordSession(as('therapist', 10), episodeId, session(12));
		expect(result.findings.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({ set: 'guideline' });
		const { changes, inpatientSet } = await unitLimitsOf(db(), unitId);
		expect(inpatientSet).toBe('guideline');
		expect(changes).toMatchObject([thing('guideline', null, null)]);
	});

	it('is refused where it is chosen already', async () => {
		const refused = chooseUnitSet(as('admin'), unitId, { set: 'strict', ...AGREED });
		await expect(refused).rejects.toMatchObject({ code: 'invalid' });
	});
});

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
			['event', 'Limit systolic-fall for this patient: 6 in place of 10, until 2026-03-05. Tight left main.']
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

it('a client that believes in other limits is judged by those on record', async () => {
	const body = session(12);
	const believed = { ...body, context: { ...body.context, limits: { 'systolic-fall': 40 } } };
	const { result } = await recordSession(as('therapist', 10), episodeId, believed);
	expect(result.findings.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({ limit: 10 });
});
