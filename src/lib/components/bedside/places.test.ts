import { describe, expect, it } from 'vitest';
import { assess } from '$lib/domain/bedside/assess';
import { RULE_IDS } from '$lib/domain/bedside/codes';
import { session } from '$lib/domain/bedside/testing/sample';
import { duringIndexOf, placeOf } from './places';

describe('placeOf', () => {
	it.each(RULE_IDS)('has a place for %s', (rule) => {
		expect(placeOf({ rule, reading: 'after' })).toEqual(expect.any(String));
	});

	it('puts a rhythm that was not on record beside the question', () => {
		expect(placeOf({ rule: 'new-rhythm', reading: 'before' })).toBe('rhythm');
		expect(placeOf({ rule: 'new-rhythm', reading: 'after' })).toBe('hr');
	});
});

describe('duringIndexOf', () => {
	const REST = { posture: 'sitting', bpSource: 'cuff', sbp: 120, dbp: 72, hr: 78 } as const;

	it('points at the reading in effort whose value it is', () => {
		const input = session({ during: [REST, { ...REST, sbp: 105 }, { ...REST, sbp: 116 }] });
		const fall = assess(input).findings.find(({ rule }) => rule === 'systolic-fall');
		expect(fall?.measured).toBe(15);
		expect(fall && duringIndexOf(fall, input)).toBe(1);
	});

	it('points at the later of two readings for a fall between them', () => {
		const input = session({
			during: [
				{ ...REST, sbp: 150, work: 1 },
				{ ...REST, sbp: 138, work: 2 }
			]
		});
		const fall = assess(input).findings.find(({ rule }) => rule === 'systolic-stage-fall');
		expect(fall && duringIndexOf(fall, input)).toBe(1);
	});

	it('leaves findings of other moments alone', () => {
		const input = session({ after: { ...REST, sbp: 100 } });
		const fall = assess(input).findings.find(({ reading }) => reading === 'after');
		expect(fall && duringIndexOf(fall, input)).toBeNull();
	});
});
