import { describe, expect, it } from 'vitest';
import { isUnreached } from './unreached';

describe('isUnreached', () => {
	it.each([
		['Chromium', new TypeError('Failed to fetch')],
		['Chromium, of a part of the page', new TypeError('Failed to fetch dynamically imported module: /x.js')],
		['Firefox', new TypeError('NetworkError when attempting to fetch resource.')],
		['Safari', new TypeError('Load failed')]
	])('knows a request without an answer in %s', (_, thrown) => {
		expect(isUnreached(thrown)).toBe(true);
	});

	it.each([
		['a fault in the page', new TypeError("Cannot read properties of undefined (reading 'name')")],
		['an error of another kind', new Error('Failed to fetch')],
		['something that is no error', 'Failed to fetch']
	])('does not take %s for one', (_, thrown) => {
		expect(isUnreached(thrown)).toBe(false);
	});
});
