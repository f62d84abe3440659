import { randomUUID } from 'node:crypto';
import { SOME, type Body, type Call } from './call';
import { clearanceCalls } from './clearances';
import { escalationCalls } from './escalations';
import { Makers, type People } from './makers';
import { referralCalls } from './referrals';
import { visitCalls } from './visits';

const READINGS = {
	context: { betaBlocked: true, rhythm: 'sinus', sternotomy: true, level: 4, conscious: true },
	before: { hr: 76, sbp: 128, dbp: 74 },
	during: [],
	after: { hr: 80, sbp: 126, dbp: 72 },
	symptoms: [],
	activities: []
};
const TIMES = { startedAt: '2026-01-02T10:00:00Z', endedAt: '2026-01-02T10:20:00Z', level: 4 };

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
			answer: { status: 201, body: { id: SOME, patientId: SOME } },
			other: newAdmission(),
			wrong: null
		},
		{
			name: 'refer',
			by: 'surgeon',
			path: async () => `/api/episodes/${await make.episode()}/referrals`,
			body: { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' },
			answer: { status: 201, body: { id: SOME, threadId: SOME, state: 'asked' } },
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
			answer: { status: 201, body: { id: SOME, findings: [], outcome: 'clear' } },
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
