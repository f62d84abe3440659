import path from 'node:path';
import Database from 'libsql';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES, type Role } from '$lib/domain/core/codes';
import { signInAs, SIGN_INS, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { API } from './access-table';

/** What exists in a unit is, for whoever does not belong to it, not there: 404, whatever they would do with it. */

const WHY = { reason: 'Not today.' };
const CALL = { grade: 'low', situation: 's', background: 'b', assessment: 'a', request: 'r' };
const SESSION = {
	context: { betaBlocked: true, rhythm: 'sinus', sternotomy: true, level: 4, conscious: true },
	before: { hr: 76, sbp: 128, dbp: 74 },
	during: [],
	after: { hr: 80, sbp: 126, dbp: 72 },
	symptoms: [],
	activities: [],
	startedAt: '2026-01-02T10:00:00Z',
	endedAt: '2026-01-02T10:20:00Z',
	level: 4
};

/** Bodies that their handlers take, so that the unit decides; the others take an empty one. */
const BODIES: Record<string, object> = {
	'POST /api/episodes/[id]/move': { unit: 'Tern Ward', bed: 'Z9' },
	'POST /api/episodes/[id]/operations': {
		procedure: 'Bypass',
		approach: 'sternotomy',
		operatedAt: '2026-01-02T10:00:00Z'
	},
	'POST /api/episodes/[id]/session-amendments': { sessionId: 'a', kind: 'amended', body: 'More.' },
	'POST /api/episodes/[id]/close': { reason: 'home' },
	'POST /api/episodes/[id]/referrals': { service: 'physiotherapy', priority: 'soon', question: 'Begin.' },
	'POST /api/episodes/[id]/clearances': { kind: 'treadmill', question: 'May it start?' },
	'POST /api/episodes/[id]/level': { to: 3, reason: 'Walks well.' },
	'POST /api/episodes/[id]/limits': { key: 'systolic-ceiling', value: 170, untilOn: '2099-12-01', ...WHY },
	'POST /api/episodes/[id]/prescribed-ranges': { hrMax: 118, method: 'walk-test' },
	'POST /api/episodes/[id]/wound-notes': { wound: 'dry' },
	'POST /api/episodes/[id]/lines': { kind: 'urinary-catheter' },
	'POST /api/episodes/[id]/oxygen-notes': { lpm: 2 },
	'POST /api/episodes/[id]/sessions': SESSION,
	'POST /api/episodes/[id]/escalations': CALL,
	'POST /api/episodes/[id]/visits': { startsAt: '2099-12-01T10:00:00Z', minutes: 45, place: 'East Gym' },
	'POST /api/episodes/[id]/patient-page': { way: 'sms' },
	'POST /api/visits/[id]/move': { startsAt: '2099-12-02T10:00:00Z' },
	'POST /api/sign-offs/[id]/refuse': WHY,
	'POST /api/referrals/[id]/decline': WHY,
	'POST /api/referrals/[id]/withdraw': WHY,
	'POST /api/threads/[id]/entries': { body: 'She slept well.' },
	'POST /api/clearances/[id]/withhold': WHY,
	'POST /api/clearances/[id]/hold': WHY,
	'POST /api/clearances/[id]/ask-back': { question: 'How far?' },
	'POST /api/clearances/[id]/answer': { answer: 'To the door.' },
	'POST /api/clearances/[id]/withdraw': WHY,
	'POST /api/escalations/[id]/eta': { etaMinutes: 5 },
	'POST /api/escalations/[id]/inform': { informed: 'Dr Keel' },
	'POST /api/escalations/[id]/pass': { to: 'somebody', ...WHY },
	'POST /api/escalations/[id]/settle': { outcome: 'stays', note: 'Better.' },
	'POST /api/escalations/[id]/withdraw': WHY,
	'POST /api/visits/[id]/reopen': WHY
};

/** Every row of the table that names a patient or something of theirs; closing comes last, because it ends things. */
const ROWS = Object.entries(API)
	.filter(
		([handler]) =>
			handler.includes('[id]') &&
			!['/api/units/', '/api/closed-days/', '/api/messages/'].some((part) => handler.includes(part))
	)
	.toSorted(([a], [b]) => Number(a.endsWith('/close')) - Number(b.endsWith('/close')));

const TERN = `(select e.id from episodes e join units u on u.id = e.unit_id where u.name = 'Tern Ward')`;
const OF_TERN = `where episode_id in ${TERN} limit 1`;
/** Where one of each kind is found; `api/<kind>/[id]` names it. */
const FOUND: Record<string, string> = {
	episodes: `select id from episodes where id in ${TERN} limit 1`,
	referrals: `select id from referrals ${OF_TERN}`,
	threads: `select id from threads ${OF_TERN}`,
	clearances: `select id from clearances ${OF_TERN}`,
	escalations: `select id from escalations ${OF_TERN}`,
	visits: `select id from visits ${OF_TERN}`,
	'patient-pages': `select id from patient_links ${OF_TERN}`,
	'sign-offs': `select id from sign_offs ${OF_TERN}`,
	deviations: `select id from deviations ${OF_TERN}`,
	limits: `select id from patient_limits ${OF_TERN}`,
	lines: `select id from lines ${OF_TERN}`
};

/** What the demonstration has none of, as its first patient of the ward could have it. */
const ADDED = `
	insert into sign_offs (id, episode_id, kind, state, to_level, words, asked_by, asked_at)
		select 'a-sign-off', e.id, 'level', 'asked', 3, 'Walks.', u.id, 1 from episodes e, users u where e.id in ${TERN} limit 1;
	insert into deviations (id, episode_id, session_id, kind, reason, recorded_by, recorded_at)
		select 'a-deviation', episode_id, id, 'arm-stage', 'Why.', recorded_by, 1 from bedside_sessions ${OF_TERN};
	insert into patient_limits (id, episode_id, version, limit_key, value, reason, until_on, set_by, set_at)
		select 'a-limit', e.id, 1, 'systolic-ceiling', 170, 'Why.', '2099-12-01', u.id, 1 from episodes e, users u where e.id in ${TERN} limit 1;
	insert into patient_links (id, token_hash, episode_id, way, created_by, created_at, expires_at)
		select 'a-page', 'none', e.id, 'sms', u.id, 1, 9999999999999 from episodes e, users u where e.id in ${TERN} limit 1;
	insert into mentions (id, entry_id, user_id)
		select 'mention-of-' || u.email, n.id, u.id from users u, (
			select e.id from entries e join threads t on t.id = e.thread_id where t.episode_id in ${TERN} limit 1
		) n where true on conflict do update set id = excluded.id;`;

let product: Product;
const ids: Record<string, string> = {};
const clients = new Map<Role, Client>();

/** Work on the file while the server is stopped: one process owns it. */
async function onTheFile(work: (connection: Database.Database) => void): Promise<void> {
	await product.kill('SIGTERM');
	const connection = new Database(path.join(product.dataDir, 'ropewalk.db'));
	work(connection);
	connection.close();
	await product.restart();
}

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	await onTheFile((connection) => {
		connection.exec(ADDED);
		for (const [kind, sql] of Object.entries(FOUND)) {
			ids[kind] = (connection.prepare(sql).get() as { id: string }).id;
		}
	});
	for (const role of ROLES) {
		clients.set(role, await signInAs(product.url, role));
	}
});
afterAll(() => product?.stop());

async function ask(handler: string, role: Role): Promise<number> {
	const [method = '', address = ''] = handler.split(' ');
	const kind = address.split('/')[2] ?? '';
	const id = kind === 'mentions' ? `mention-of-${SIGN_INS[role]}` : (ids[kind] ?? 'none');
	const body = method === 'GET' ? undefined : (BODIES[handler] ?? {});
	const answer = await clients.get(role)?.send(method, address.replace('[id]', id), body);
	return answer?.status ?? 0;
}

const rolesOf = ({ roles }: (typeof API)[string]) => ROLES.filter((role) => roles.includes(role));

describe('what exists in a unit', () => {
	it.each(ROWS)('is there for its people: %s', async (handler, row) => {
		const statuses: number[] = [];
		for (const role of rolesOf(row)) {
			statuses.push(await ask(handler, role));
		}
		// Done, in another state by now, or not for this person: of what does not exist each would say 404.
		expect(statuses.filter((status) => ![200, 201, 403, 409, 422].includes(status))).toEqual([]);
	});
});

describe('what exists in a unit, for people of another', () => {
	beforeAll(() =>
		onTheFile((connection) =>
			connection.exec(
				`delete from user_units where unit_id in (select id from units where name <> 'East Gym')`
			)
		)
	);

	it.each(ROWS)('is not there: %s', async (handler, row) => {
		for (const role of rolesOf(row)) {
			expect([role, await ask(handler, role)]).toEqual([role, 404]);
		}
	});
});
