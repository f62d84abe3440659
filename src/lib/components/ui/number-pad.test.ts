import { describe, expect, it } from 'vitest';
import { pressed, type PadKey } from './number-pad';

const type = (keys: PadKey[], decimals: boolean) =>
	keys.reduce((text, key) => pressed(text, key, { decimals, digits: 3 }), '');

describe('pressed', () => {
	it.each<{ keys: PadKey[]; decimals: boolean; text: string }>([
		{ keys: ['1', '2'], decimals: false, text: '12' },
		{ keys: ['1', '2', '8'], decimals: false, text: '128' },
		{ keys: ['1', '2', '8', '0'], decimals: false, text: '128' },
		{ keys: ['1', '2', 'erase', '3'], decimals: false, text: '13' },
		{ keys: ['erase'], decimals: false, text: '' },
		{ keys: ['0', '7'], decimals: false, text: '7' },
		{ keys: ['7', '.', '2'], decimals: false, text: '72' },
		{ keys: ['3', '7', '.', '5'], decimals: true, text: '37.5' },
		{ keys: ['3', '7', '.', '.', '5', '9'], decimals: true, text: '37.5' },
		{ keys: ['.', '5'], decimals: true, text: '0.5' }
	])('$keys gives "$text"', ({ keys, decimals, text }) => {
		expect(type(keys, decimals)).toBe(text);
	});
});
