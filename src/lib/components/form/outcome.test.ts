import { describe, expect, it } from 'vitest';
import { outcomeOf, type ActionAnswer, type Outcome } from './outcome';

describe('outcomeOf', () => {
	it.each<[string, ActionAnswer, Outcome | null]>([
		['a success', { type: 'success' }, null],
		['errors beside fields', { type: 'failure' }, null],
		['a redirect to the next page', { type: 'redirect', location: '/ward?unit=1' }, null],
		['a page that only begins like it', { type: 'redirect', location: '/sign-in-help' }, null],
		[
			'a redirect to the sign-in',
			{ type: 'redirect', location: '/sign-in?next=%2Fward' },
			{ kind: 'sign-in', href: '/sign-in?next=%2Fward' }
		],
		['401', { type: 'error', status: 401, error: { message: 'x' } }, { kind: 'sign-in', href: '/sign-in' }],
		[
			'403',
			{ type: 'error', status: 403, error: { message: 'Not yours.' } },
			{ kind: 'refused', message: 'Not yours.' }
		],
		['499', { type: 'error', status: 499, error: {} }, { kind: 'refused', message: '' }],
		['500', { type: 'error', status: 500, error: { message: 'x' } }, { kind: 'unreached' }],
		['no answer', { type: 'error', error: { message: 'Failed to fetch' } }, { kind: 'unreached' }]
	])('of %s', (_, answer, expected) => {
		expect(outcomeOf(answer, '/sign-in')).toEqual(expected);
	});
});
