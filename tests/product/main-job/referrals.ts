import { INSTANT, now, SOME, type Call } from './call';
import { OTHER_WHY, WHY, type Makers } from './makers';

const ENTRY = {
	id: SOME,
	seq: 3,
	at: INSTANT,
	author: { id: SOME, name: SOME, role: 'nurse' },
	strand: 'nursing',
	kind: 'note',
	body: 'She slept well.',
	ref: null,
	asked: []
};

export function referralCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'asked' | 'accepted' | 'withdrawn') => async () =>
		`/api/referrals/${(await make.referral(state)).id}/${deed}`;
	return [
		{
			name: 'accept',
			by: 'therapist',
			path: on('accept', 'asked'),
			body: {},
			answer: now('accepted'),
			other: WHY,
			wrong: on('accept', 'accepted')
		},
		{
			name: 'decline',
			by: 'therapist',
			path: on('decline', 'asked'),
			body: WHY,
			answer: now('declined'),
			other: OTHER_WHY,
			wrong: on('decline', 'withdrawn')
		},
		{
			name: 'close',
			by: 'therapist',
			path: on('close', 'accepted'),
			body: {},
			answer: now('closed'),
			other: WHY,
			wrong: on('close', 'withdrawn')
		},
		{
			name: 'withdraw a referral',
			by: 'surgeon',
			path: on('withdraw', 'asked'),
			body: WHY,
			answer: now('withdrawn'),
			other: OTHER_WHY,
			wrong: on('withdraw', 'withdrawn')
		},
		{
			name: 'talk',
			by: 'nurse',
			path: async () => `/api/threads/${(await make.referral('accepted')).threadId}/entries`,
			body: { body: 'She slept well.' },
			answer: { status: 201, body: ENTRY },
			other: { body: 'She did not.' },
			wrong: async () => `/api/threads/${(await make.referral('withdrawn')).threadId}/entries`
		}
	];
}
