import { describe, expect, it } from 'vitest';
import { CLEARANCE_STATES } from '../core/codes';
import { isInForce, stateOn } from './states';

describe('stateOn', () => {
	it.each([
		['given', '2026-03-03', 'given'],
		['given', '2026-03-02', 'lapsed'],
		['given-with-limits', '2026-03-03', 'given-with-limits'],
		['given-with-limits', '2026-03-02', 'lapsed'],
		['on-hold', '2026-03-03', 'on-hold'],
		['on-hold', '2026-03-02', 'lapsed'],
		['asked', '2026-03-02', 'asked'],
		['withheld', '2026-03-02', 'withheld'],
		['withdrawn', '2026-03-02', 'withdrawn'],
		['lapsed', '2026-03-04', 'lapsed'],
		['given', null, 'given']
	] as const)('%s until %s is %s on 3 March 2026', (state, reviewOn, expected) => {
		expect(stateOn({ state, reviewOn }, '2026-03-03')).toBe(expected);
	});
});

describe('isInForce', () => {
	it.each(CLEARANCE_STATES)('%s: never after its last day', (state) => {
		expect(isInForce({ state, reviewOn: '2026-03-02' }, '2026-03-03')).toBe(false);
	});

	it.each(CLEARANCE_STATES)('%s: on its last day only where it was given', (state) => {
		expect(isInForce({ state, reviewOn: '2026-03-03' }, '2026-03-03')).toBe(state.startsWith('given'));
	});
});
