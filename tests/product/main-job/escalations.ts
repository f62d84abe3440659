import { INSTANT, now, SOME, type Call } from './call';
import { CALL, OTHER_WHY, WHY, type Makers } from './makers';

/** Times of a grave call: common practice, no published source. */
const HIGH_CHAIN = [
	{ step: 0, afterSeconds: 0, post: 'nurse' },
	{ step: 0, afterSeconds: 0, post: 'nurse-in-charge' },
	{ step: 1, afterSeconds: 120, post: 'nurse' },
	{ step: 1, afterSeconds: 120, post: 'nurse-in-charge' },
	{ step: 2, afterSeconds: 180, post: 'physician' },
	{ step: 3, afterSeconds: 480, post: 'surgeon' }
];

export function escalationCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'raised' | 'taken' | 'passed' | 'settled') => async () =>
		`/api/escalations/${await make.escalation(state)}/${deed}`;
	return [
		{
			name: 'call for help',
			by: 'therapist',
			path: async () => `/api/episodes/${await make.episode()}/escalations`,
			body: CALL,
			answer: { status: 201, body: { id: SOME, state: 'raised', chain: HIGH_CHAIN } },
			other: { ...CALL, grade: 'low' },
			wrong: null
		},
		{
			name: 'take',
			by: 'physician',
			path: on('take', 'raised'),
			body: {},
			answer: {
				status: 200,
				body: { id: SOME, state: 'taken', takenBy: { id: SOME, name: SOME }, takenAt: INSTANT }
			},
			other: { etaMinutes: 5 },
			wrong: on('take', 'taken')
		},
		{
			name: 'arrive',
			by: 'nurse',
			path: on('arrive', 'taken'),
			body: {},
			answer: now('taken'),
			other: null,
			wrong: on('arrive', 'raised')
		},
		{
			name: 'pass',
			by: 'nurse',
			path: on('pass', 'taken'),
			body: () => ({ reason: 'Off duty.', to: make.physicianId }),
			answer: now('taken'),
			other: { reason: 'Another reason.', to: 'somebody' },
			wrong: on('pass', 'settled')
		},
		{
			name: 'confirm a pass',
			by: 'physician',
			path: on('confirm', 'passed'),
			body: {},
			answer: now('taken'),
			other: null,
			wrong: on('confirm', 'settled')
		},
		{
			name: 'settle',
			by: 'nurse',
			path: on('settle', 'taken'),
			body: { outcome: 'stays', note: 'Lies down, better.' },
			answer: now('settled'),
			other: { outcome: 'stays', note: 'Better.' },
			wrong: on('settle', 'settled')
		},
		{
			name: 'withdraw a call',
			by: 'therapist',
			path: on('withdraw', 'raised'),
			body: WHY,
			answer: now('withdrawn'),
			other: OTHER_WHY,
			wrong: on('withdraw', 'settled')
		}
	];
}
