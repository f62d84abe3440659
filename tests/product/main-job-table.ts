import { randomUUID } from 'node:crypto';
import type { Client } from '../support/api';
import { admit } from '../support/api';

/** One call of the main job that changes something, and how to bring about what it needs. */
export interface Call {
	name: string;
	by: Role;
	/** Makes what the call is about, and gives its address. */
	path: () => Promise<string>;
	body: Body | (() => Body);
	/** Another body that the same call would take; null where it takes none. */
	other: Body | null;
	/** What it does not take; a field that nobody knows where left out. */
	bad?: Body;
	/** The same address in a state that does not allow the call; null where every state does. */
	wrong: (() => Promise<string>) | null;
}

type Body = Record<string, unknown>;
export type Role = 'surgeon' | 'nurse' | 'therapist' | 'physician' | 'coordinator';
export type People = Record<Role, Client>;

const WHY = { reason: 'Not today.' };
const OTHER_WHY = { reason: 'Another reason.' };
const CALL = { grade: 'high', situation: 's', background: 'b', assessment: 'a', request: 'r' };
const ASK = { kind: 'corridor', question: 'She walks well. May she go out?' };
const READINGS = {
	context: { betaBlocked: true, rhythm: 'sinus', sternotomy: true, level: 4, conscious: true },
	before: { hr: 76, sbp: 128, dbp: 74 },
	during: [],
	after: { hr: 80, sbp: 126, dbp: 72 },
	symptoms: [],
	activities: []
};
const TIMES = { startedAt: '2026-01-02T10:00:00Z', endedAt: '2026-01-02T10:20:00Z', level: 4 };
const MONTH_MS = 30 * 24 * 60 * 60 * 1000;
const VISIT = { startsAt: new Date(Date.now() + MONTH_MS).toISOString(), minutes: 45, place: 'East Gym' };

const MOVE = { startsAt: new Date(Date.now() + 2 * MONTH_MS).toISOString() };
const SERIES = {
	from: MOVE.startsAt.slice(0, 10),
	weekdays: ['mon', 'wed', 'fri'],
	time: '16:00',
	count: 2,
	minutes: 45,
	place: 'East Gym'
};

/**
 * Every call of the main job that changes something.
 * @param people signed in by the time that a path is asked for
 */
export function mainJob(people: () => People): Call[] {
	const make = new Makers(people);
	let admission: Body = {};
	return [
		{
			name: 'admit',
			by: 'coordinator',
			path: async () => {
				admission = newAdmission();
				return '/api/episodes';
			},
			body: () => admission,
			other: newAdmission(),
			wrong: null
		},
		{
			name: 'refer',
			by: 'surgeon',
			path: async () => `/api/episodes/${await make.episode()}/referrals`,
			body: { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' },
			other: { service: 'physiotherapy', priority: 'soon', question: 'Go on.' },
			wrong: null
		},
		...referralCalls(make),
		...clearanceCalls(make),
		{
			name: 'record a session',
			by: 'therapist',
			path: async () => `/api/episodes/${await make.episode()}/sessions`,
			body: { ...READINGS, ...TIMES },
			other: { ...READINGS, ...TIMES, level: 3 },
			bad: { ...READINGS, ...TIMES, before: { hr: 251 } },
			wrong: null
		},
		...escalationCalls(make),
		...visitCalls(make)
	];
}

/** Somebody who was never here, into a bed that nobody has. */
function newAdmission(): Body {
	const mrn = `M ${randomUUID()}`;
	return {
		patient: { name: 'Ines Marram', birthDate: '1950-01-31', sex: 'female', mrn },
		unit: 'Tern Ward',
		bed: mrn.slice(0, 12),
		level: 2
	};
}

function referralCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'asked' | 'accepted' | 'withdrawn') => async () =>
		`/api/referrals/${(await make.referral(state)).id}/${deed}`;
	return [
		{
			name: 'accept',
			by: 'therapist',
			path: on('accept', 'asked'),
			body: {},
			other: WHY,
			wrong: on('accept', 'accepted')
		},
		{
			name: 'decline',
			by: 'therapist',
			path: on('decline', 'asked'),
			body: WHY,
			other: OTHER_WHY,
			wrong: on('decline', 'withdrawn')
		},
		{
			name: 'close',
			by: 'therapist',
			path: on('close', 'accepted'),
			body: {},
			other: WHY,
			wrong: on('close', 'withdrawn')
		},
		{
			name: 'withdraw a referral',
			by: 'surgeon',
			path: on('withdraw', 'asked'),
			body: WHY,
			other: OTHER_WHY,
			wrong: on('withdraw', 'withdrawn')
		},
		{
			name: 'talk',
			by: 'nurse',
			path: async () => `/api/threads/${(await make.referral('accepted')).threadId}/entries`,
			body: { body: 'She slept well.' },
			other: { body: 'She did not.' },
			wrong: async () => `/api/threads/${(await make.referral('withdrawn')).threadId}/entries`
		}
	];
}

function clearanceCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'asked' | 'given' | 'withdrawn') => async () =>
		`/api/clearances/${(await make.clearance(state)).id}/${deed}`;
	return [
		{
			name: 'ask for a clearance',
			by: 'therapist',
			path: async () => `/api/episodes/${await make.episode()}/clearances`,
			body: ASK,
			other: { ...ASK, question: 'And now?' },
			wrong: async () => `/api/episodes/${(await make.clearance('asked')).episodeId}/clearances`
		},
		{
			name: 'give',
			by: 'surgeon',
			path: on('give', 'asked'),
			body: {},
			other: { note: 'Slowly.' },
			wrong: on('give', 'withdrawn')
		},
		{
			name: 'withhold',
			by: 'surgeon',
			path: on('withhold', 'asked'),
			body: WHY,
			other: OTHER_WHY,
			wrong: on('withhold', 'withdrawn')
		},
		{
			name: 'hold',
			by: 'surgeon',
			path: on('hold', 'given'),
			body: WHY,
			other: OTHER_WHY,
			wrong: on('hold', 'withdrawn')
		},
		{
			name: 'withdraw a clearance',
			by: 'surgeon',
			path: on('withdraw', 'given'),
			body: WHY,
			other: OTHER_WHY,
			wrong: on('withdraw', 'withdrawn')
		}
	];
}

function escalationCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'raised' | 'taken' | 'passed' | 'settled') => async () =>
		`/api/escalations/${await make.escalation(state)}/${deed}`;
	return [
		{
			name: 'call for help',
			by: 'therapist',
			path: async () => `/api/episodes/${await make.episode()}/escalations`,
			body: CALL,
			other: { ...CALL, grade: 'low' },
			wrong: null
		},
		{
			name: 'take',
			by: 'physician',
			path: on('take', 'raised'),
			body: {},
			other: { etaMinutes: 5 },
			wrong: on('take', 'taken')
		},
		{
			name: 'arrive',
			by: 'nurse',
			path: on('arrive', 'taken'),
			body: {},
			other: null,
			wrong: on('arrive', 'raised')
		},
		{
			name: 'pass',
			by: 'nurse',
			path: on('pass', 'taken'),
			body: () => ({ reason: 'Off duty.', to: make.physicianId }),
			other: { reason: 'Another reason.', to: 'somebody' },
			wrong: on('pass', 'settled')
		},
		{
			name: 'confirm a pass',
			by: 'physician',
			path: on('confirm', 'passed'),
			body: {},
			other: null,
			wrong: on('confirm', 'settled')
		},
		{
			name: 'settle',
			by: 'nurse',
			path: on('settle', 'taken'),
			body: { outcome: 'stays', note: 'Lies down, better.' },
			other: { outcome: 'stays', note: 'Better.' },
			wrong: on('settle', 'settled')
		},
		{
			name: 'withdraw a call',
			by: 'therapist',
			path: on('withdraw', 'raised'),
			body: WHY,
			other: OTHER_WHY,
			wrong: on('withdraw', 'settled')
		}
	];
}

function visitCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'planned' | 'cancelled') => async () =>
		`/api/visits/${await make.visit(state)}/${deed}`;
	const deed = (name: string): Call => ({
		name: `${name} a visit`,
		by: 'coordinator',
		path: on(name, 'planned'),
		body: {},
		other: WHY,
		wrong: on(name, 'cancelled')
	});
	return [
		{
			name: 'book a visit',
			by: 'coordinator',
			path: async () => `/api/episodes/${await make.episode()}/visits`,
			body: VISIT,
			other: { ...VISIT, minutes: 30 },
			wrong: null
		},
		deed('confirm'),
		deed('cancel'),
		deed('attend'),
		deed('miss'),
		{
			name: 'move a visit',
			by: 'coordinator',
			path: on('move', 'planned'),
			body: MOVE,
			other: { ...MOVE, minutes: 30 },
			bad: { startsAt: 'tomorrow' },
			wrong: on('move', 'cancelled')
		},
		{
			name: 'book a series',
			by: 'coordinator',
			path: async () => `/api/episodes/${await make.episode()}/visits`,
			body: { series: SERIES },
			other: { series: { ...SERIES, count: 3 } },
			bad: { series: { ...SERIES, count: 61 } },
			wrong: null
		}
	];
}

/** Brings things into a state, each time for a patient of their own. */
export class Makers {
	physicianId = '';

	constructor(private readonly people: () => People) {}

	episode(): Promise<string> {
		return admit(this.people().surgeon);
	}

	async referral(state: 'asked' | 'accepted' | 'withdrawn') {
		const { id, threadId } = await this.#post('surgeon', `/api/episodes/${await this.episode()}/referrals`, {
			service: 'physiotherapy',
			priority: 'soon',
			question: 'Begin to mobilise.'
		});
		if (state === 'accepted') {
			await this.#post('therapist', `/api/referrals/${id}/accept`, {});
		}
		if (state === 'withdrawn') {
			await this.#post('surgeon', `/api/referrals/${id}/withdraw`, WHY);
		}
		return { id, threadId };
	}

	async clearance(state: 'asked' | 'given' | 'withdrawn') {
		const episodeId = await this.episode();
		const { id } = await this.#post('therapist', `/api/episodes/${episodeId}/clearances`, ASK);
		if (state !== 'asked') {
			await this.#post('surgeon', `/api/clearances/${id}/give`, {});
		}
		if (state === 'withdrawn') {
			await this.#post('surgeon', `/api/clearances/${id}/withdraw`, WHY);
		}
		return { id, episodeId };
	}

	async escalation(state: 'raised' | 'taken' | 'passed' | 'settled'): Promise<string> {
		const { id } = await this.#post('therapist', `/api/episodes/${await this.episode()}/escalations`, CALL);
		const path = `/api/escalations/${id}`;
		const { user } = (await this.people().physician.get('/api/me')).body as unknown as {
			user: { id: string };
		};
		this.physicianId = user.id;
		if (state !== 'raised') {
			await this.#post('nurse', `${path}/take`, {});
		}
		if (state === 'passed') {
			await this.#post('nurse', `${path}/pass`, { to: this.physicianId, reason: 'Off duty.' });
		}
		if (state === 'settled') {
			await this.#post('nurse', `${path}/settle`, { outcome: 'stays', note: 'Better.' });
		}
		return String(id);
	}

	async visit(state: 'planned' | 'cancelled'): Promise<string> {
		const { items } = await this.#post('coordinator', `/api/episodes/${await this.episode()}/visits`, VISIT);
		const id = String((items as unknown as { id: string }[])[0]?.id);
		if (state === 'cancelled') {
			await this.#post('coordinator', `/api/visits/${id}/cancel`, {});
		}
		return id;
	}

	async #post(by: Role, path: string, body: object): Promise<Record<string, unknown>> {
		const answer = await this.people()[by].post(path, body, { 'idempotency-key': randomUUID() });
		if (answer.status >= 300) {
			throw new Error(`${path} was answered ${answer.status}: ${answer.text}`);
		}
		return answer.body;
	}
}
