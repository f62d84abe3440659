import { describe, expect, it } from 'vitest';
import { outcomeOf, type ActionAnswer, type Outcome } from './outcome';

describe('outcomeOf', () => {
	it.each<[string, ActionAnswer, Outcome | null]>([
		['a success', { type: 'success' }, null],
		['errors beside fields', { type: 'failure' }, null],
		[
			'words that were changed after they had arrived',
			{ type: 'failure', data: { code: 'idempotency-mismatch' } },
			{ kind: 'arrived' }
		],
		['another failure', { type: 'failure', data: { code: 'wrong-state' } }, null],
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
		['500', { type: 'error', status: 500, error: { message: 'x' } }, { kind: 'unreached', offline: false }],
		[
			'no answer',
			{ type: 'error', error: { message: 'Failed to fetch' } },
			{ kind: 'unreached', offline: false }
		]
	])('of %s', (_, answer, expected) => {
		expect(outcomeOf(answer, '/sign-in', false)).toEqual(expected);
	});

	it.each<[string, ActionAnswer, Outcome | null]>([
		['no answer', { type: 'error', error: {} }, { kind: 'unreached', offline: true }],
		[
			'no answer, as the form library hands it on',
			{ type: 'error', status: 500, error: new TypeError('Failed to fetch') },
			{ kind: 'unreached', offline: true }
		],
		[
			'500, which is an answer',
			{ type: 'error', status: 500, error: {} },
			{ kind: 'unreached', offline: false }
		],
		['a success', { type: 'success' }, null]
	])('of %s on a device that has no network', (_, answer, expected) => {
		expect(outcomeOf(answer, '/sign-in', true)).toEqual(expected);
	});
});
