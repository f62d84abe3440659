import { describe, expect, it } from 'vitest';
import { mailProblem, textProblem, type Reachable } from './reach';

const ALL: Reachable = {
	phone: '+353865550100',
	smsConsent: true,
	smsOptedOutAt: null,
	email: 'pat@post.example',
	mailConsent: true
};

describe('whether a patient may be written to', () => {
	it.each<[Partial<Reachable>, string | null, string | null]>([
		[{}, null, null],
		[{ phone: null }, 'no-number', null],
		[{ smsConsent: false }, 'no-consent', null],
		[{ smsOptedOutAt: 1 }, 'opted-out', null],
		[{ smsOptedOutAt: 1, smsConsent: false }, 'opted-out', null],
		[{ email: null }, null, 'no-address'],
		[{ mailConsent: false }, null, 'no-consent']
	])('%j: by text %j, by mail %j', (change, text, mail) => {
		expect([textProblem({ ...ALL, ...change }), mailProblem({ ...ALL, ...change })]).toEqual([text, mail]);
	});
});
