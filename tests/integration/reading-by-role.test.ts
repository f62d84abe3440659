import { beforeAll, describe, expect, it } from 'vitest';
import { CLINICAL_ROLES, type Role } from '$lib/domain/core/codes';
import { listSessions } from '$lib/server/bedside/queries';
import { recordSession } from '$lib/server/bedside/actions';
import { askClearance } from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { listEpisodes } from '$lib/server/episodes/list';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { acceptReferral, refer } from '$lib/server/referrals/actions';
import { postEntry } from '$lib/server/threads/actions';
import { getThread } from '$lib/server/threads/queries';
import { contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const ALL = { limit: 200, after: null };
/** A fall of 20 in the systolic pressure: API.md, rule systolic-fall, stops over 10. */
const SESSION = {
	context: { betaBlocked: true, rhythm: 'sinus', sternotomy: true, level: 2, conscious: true },
	before: { hr: 80, sbp: 128, dbp: 70 },
	during: [],
	after: { hr: 84, sbp: 108, dbp: 66 },
	symptoms: [],
	activities: [],
	startedAt: '2026-03-03T08:30:00Z',
	endedAt: '2026-03-03T08:50:00Z',
	level: 2
} as const;
const CALL = {
	grade: 'high',
	situation: 'Pressure fell to 108.',
	background: 'Bypass.',
	assessment: 'Fall of 20.',
	request: 'Please come.'
} as const;

const hospital = await openHospital();
let threadId: string;
let clearanceId: string;

beforeAll(async () => {
	const { episodeId } = hospital;
	const as = (role: Role) => contextOf(hospital.people[role]);
	const asked = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' } as const;
	const { result } = await refer(as('surgeon'), episodeId, asked);
	({ threadId } = result);
	await acceptReferral(as('therapist'), result.id);
	await postEntry(as('nurse'), threadId, { body: 'Drain out at 14:10.' });
	await recordSession(as('therapist'), episodeId, {
		...SESSION,
		during: [],
		symptoms: [],
		activities: []
	});
	await raiseEscalation(as('therapist'), episodeId, { ...CALL, threadId });
	const stairs = { kind: 'stairs', question: 'May she take the stairs?' } as const;
	clearanceId = (await askClearance(as('therapist'), episodeId, stairs)).result.id;
});

const threadOf = (role: Role) => getThread(db(), hospital.people[role], threadId, ALL);
const evidenceOf = async (role: Role) =>
	(await getClearance(db(), hospital.people[role], clearanceId, hospital.now)).evidence;
const lineOf = async (role: Role) =>
	(await listEpisodes(db(), hospital.people[role], hospital.now, null, ALL)).items.find(
		({ id }) => id === hospital.episodeId
	);

describe.each(CLINICAL_ROLES)('a %s', (role) => {
	it('reads sessions, and what a thread and a clearance tell of them', async () => {
		expect(await listSessions(db(), hospital.people[role], hospital.episodeId)).toHaveLength(1);
		const { items } = await threadOf(role);
		expect(items.find(({ kind }) => kind === 'session')?.body).toContain('128');
		expect(items.some(({ body }) => body.includes(CALL.situation))).toBe(true);
		expect((await evidenceOf(role)).sessions).toMatchObject([{ findings: [expect.stringContaining('128')] }]);
		expect((await lineOf(role))?.escalation?.grade).toBe('high');
	});
});

describe('a coordinator', () => {
	it('reads no session', async () => {
		const read = listSessions(db(), hospital.people.coordinator, hospital.episodeId);
		await expect(read).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('reads a thread without what sessions and calls for help wrote into it', async () => {
		const [theirs, all] = await Promise.all([threadOf('coordinator'), threadOf('nurse')]);
		expect(theirs.items.map(({ seq }) => seq)).toEqual(all.items.map(({ seq }) => seq));
		expect(theirs.items.some(({ body }) => body === 'Drain out at 14:10.')).toBe(true);
		const withheld = theirs.items.filter(({ body }) => body === 'Not shown to your role.');
		expect(withheld.map(({ kind, ref }) => [kind, ref])).toEqual([
			['session', null],
			['ask', null]
		]);
		expect(theirs.items.map(({ body }) => body).join('\n')).not.toMatch(/128|108|Pressure fell/);
	});

	it('is not told that there were no sessions: the evidence says that they are not shown', async () => {
		const { sessions, ...rest } = await evidenceOf('coordinator');
		expect(sessions).toBeNull();
		expect(rest.procedure).toBe('Coronary artery bypass');
	});

	it('sees the patient on the ward without the call for help', async () => {
		const line = await lineOf('coordinator');
		expect(line?.patient.name).toBe(hospital.patient.name);
		expect(line?.escalation).toBeNull();
	});
});

it.each([
	['a thread', () => threadOf('admin')],
	['a clearance', () => evidenceOf('admin')],
	['sessions', () => listSessions(db(), hospital.people.admin, hospital.episodeId)]
])('an administrator reads no %s', async (_, read) => {
	await expect(read()).rejects.toMatchObject({ code: 'not-allowed' });
});
