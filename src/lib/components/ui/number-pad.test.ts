import { describe, expect, it } from 'vitest';
import { pressed, type PadKey } from './number-pad';

const type = (keys: PadKey[], decimals: boolean, point = '.') =>
	keys.reduce((text, key) => pressed(text, key, { decimals, digits: 3, point }), '');

describe('pressed', () => {
	it.each<{ keys: PadKey[]; decimals: boolean; text: string }>([
		{ keys: ['1', '2'], decimals: false, text: '12' },
		{ keys: ['1', '2', '8'], decimals: false, text: '128' },
		{ keys: ['1', '2', '8', '0'], decimals: false, text: '128' },
		{ keys: ['1', '2', 'erase', '3'], decimals: false, text: '13' },
		{ keys: ['erase'], decimals: false, text: '' },
		{ keys: ['0', '7'], decimals: false, text: '7' },
		{ keys: ['7', 'point', '2'], decimals: false, text: '72' },
		{ keys: ['3', '7', 'point', '5'], decimals: true, text: '37.5' },
		{ keys: ['3', '7', 'point', 'point', '5', '9'], decimals: true, text: '37.5' },
		{ keys: ['point', '5'], decimals: true, text: '0.5' }
	])('$keys gives "$text"', ({ keys, decimals, text }) => {
		expect(type(keys, decimals)).toBe(text);
	});

	it('writes the sign of the reader, and no second of either kind', () => {
		expect(type(['3', '7', 'point', '5'], true, ',')).toBe('37,5');
		expect(pressed('37,5', 'point', { decimals: true, digits: 3, point: '.' })).toBe('37,5');
		expect(pressed('37,5', '6', { decimals: true, digits: 3, point: '.' })).toBe('37,5');
	});
});
