import { describe, expect, it } from 'vitest';
import { baseText, changeWords, unlikePostures } from './change';
import { typed } from './testing';

const BEFORE = typed({ sbp: '128', hr: '76', rr: '16' }, { posture: 'sitting', bpSource: 'cuff' });

describe('changeWords', () => {
	it.each([
		['sbp', '108', 'fell 20'],
		['sbp', '128', 'same'],
		['hr', '86', 'rose 10'],
		['hr', '', null],
		['hr', '1', null],
		['rr', '20', null],
		['dbp', '66', null]
	] as const)('%s %j: %j', (field, text, words) => {
		expect(changeWords(field, BEFORE, typed({ [field]: text }))).toBe(words);
	});

	it.each([
		['standing', { before: 'sitting', now: 'standing' }],
		['sitting', null],
		[null, null]
	] as const)('names the two postures where %s after sitting is another', (posture, unlike) => {
		expect(unlikePostures(BEFORE, typed({}, { posture }))).toEqual(unlike);
	});

	it('compares nothing across postures', () => {
		expect(changeWords('hr', BEFORE, typed({ hr: '90' }, { posture: 'standing' }))).toBeNull();
		expect(baseText('hr', BEFORE, typed({}, { posture: 'standing' }))).toBe('');
	});

	it('compares pressures from one source only, pulses from any', () => {
		const arterial = typed({ sbp: '108', hr: '80' }, { bpSource: 'arterial' });
		expect(changeWords('sbp', BEFORE, arterial)).toBeNull();
		expect(changeWords('hr', BEFORE, arterial)).toBe('rose 4');
	});
});
