import { expect } from 'vitest';
import { now, SOME, type Call } from './call';
import { ASK, OTHER_WHY, WHY, type Makers } from './makers';

export function clearanceCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'asked' | 'given' | 'withdrawn') => async () =>
		`/api/clearances/${(await make.clearance(state)).id}/${deed}`;
	return [
		{
			name: 'ask for a clearance',
			by: 'therapist',
			path: async () => `/api/episodes/${await make.episode()}/clearances`,
			body: ASK,
			answer: { status: 201, body: { id: SOME, state: 'asked', evidence: expect.any(Object) } },
			other: { ...ASK, question: 'And now?' },
			wrong: async () => `/api/episodes/${(await make.clearance('asked')).episodeId}/clearances`
		},
		{
			name: 'give',
			by: 'surgeon',
			path: on('give', 'asked'),
			body: {},
			answer: now('given'),
			other: { note: 'Slowly.' },
			wrong: on('give', 'withdrawn')
		},
		{
			name: 'give what nobody has decided',
			by: 'surgeon',
			path: on('give', 'asked'),
			body: { limits: { maxMinutes: 5 }, decidedAt: null },
			answer: now('given-with-limits'),
			other: { note: 'Slowly.' },
			wrong: on('give', 'given')
		},
		{
			name: 'give again, with other limits',
			by: 'surgeon',
			path: on('give', 'given'),
			body: () => ({ limits: { maxMinutes: 10 }, decidedAt: make.decidedAt }),
			answer: now('given-with-limits'),
			other: { note: 'Slowly.' },
			wrong: on('give', 'withdrawn')
		},
		{
			name: 'withhold',
			by: 'surgeon',
			path: on('withhold', 'asked'),
			body: WHY,
			answer: now('withheld'),
			other: OTHER_WHY,
			wrong: on('withhold', 'withdrawn')
		},
		{
			name: 'hold',
			by: 'surgeon',
			path: on('hold', 'given'),
			body: WHY,
			answer: now('on-hold'),
			other: OTHER_WHY,
			wrong: on('hold', 'withdrawn')
		},
		{
			name: 'withdraw a clearance',
			by: 'surgeon',
			path: on('withdraw', 'given'),
			body: WHY,
			answer: now('withdrawn'),
			other: OTHER_WHY,
			wrong: on('withdraw', 'withdrawn')
		}
	];
}
