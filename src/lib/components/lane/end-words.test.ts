import { describe, expect, it } from 'vitest';
import { LOOSE_END_KINDS } from '$lib/domain/loose-ends/loose-ends';
import { endWords } from './end-words';

const SINCE = '2026-03-03T09:00:00.000Z';
const CODES: Record<string, string> = {
	clearance: 'arm-stage',
	'clearance-question': 'arm-stage',
	refusal: 'oral-intake',
	deviation: 'oral-intake',
	referral: 'speech-therapy',
	mention: 'nurse'
};
const after = (seconds: number) => Date.parse(SINCE) + seconds * 1000;

describe('endWords', () => {
	it.each([
		[59, 'arm stage asked'],
		[60, 'arm stage asked, 1 min'],
		[119, 'arm stage asked, 1 min'],
		[7200, 'arm stage asked, 2 h']
	])('after %i s: %s', (seconds, words) => {
		const end = { kind: 'clearance', code: 'arm-stage', strand: 'medical', since: SINCE } as const;
		expect(endWords(end, after(seconds))).toBe(words);
	});

	it.each(LOOSE_END_KINDS)('has words of its own for %s, and short ones', (kind) => {
		const said = LOOSE_END_KINDS.map((each) =>
			endWords({ kind: each, code: CODES[each] ?? null, strand: 'medical', since: SINCE }, after(0))
		);
		const own = said[LOOSE_END_KINDS.indexOf(kind)] ?? '';
		expect(said.filter((words) => words === own)).toHaveLength(1);
		expect(own.length).toBeLessThanOrEqual(40);
	});
});
