import { describe, expect, it } from 'vitest';
import { LEVELS, type Level } from '$lib/domain/core/codes';
import { mayDoNow } from '$lib/domain/episodes/may-do-now';
import { groupWords, mayDoGroups, mayDoWords, type MayDoOf } from './may-do';

describe('mayDoGroups', () => {
	it.each<[Level, string]>([
		[1, 'bed one helper · chair two helpers · bathroom, corridor, stairs not'],
		[2, 'bed alone · chair, bathroom one helper · corridor, stairs not'],
		[3, 'bed, chair alone · bathroom, corridor one helper · stairs not'],
		[4, 'bed, chair, bathroom alone · corridor one helper · stairs not'],
		[5, 'bed, chair, bathroom, corridor alone · stairs not']
	])('of level %d reads %s', (level, words) => {
		expect(mayDoGroups(mayDoNow(level, [])).map(groupWords).join(' · ')).toBe(words);
	});

	it('keeps apart what is not beside each other', () => {
		const groups = mayDoGroups({
			bed: 'alone',
			chair: 'one',
			bathroom: 'alone',
			corridor: 'one',
			stairs: 'not'
		});
		expect(groups.map((group) => group.places)).toEqual([
			['bed'],
			['chair'],
			['bathroom'],
			['corridor'],
			['stairs']
		]);
	});

	it.each(LEVELS)('names every place of level %d once', (level) => {
		const places = mayDoGroups(mayDoNow(level, [])).flatMap((group) => group.places);
		expect(places).toEqual(['bed', 'chair', 'bathroom', 'corridor', 'stairs']);
	});
});

describe('mayDoWords', () => {
	const LEVEL_2 = mayDoNow(2, []);
	it.each<[MayDoOf, boolean, string]>([
		[
			{ phase: 'inpatient', mayDoNow: LEVEL_2, notKnown: [] },
			false,
			'bed alone · chair, bathroom one helper · corridor, stairs not'
		],
		[
			{ phase: 'inpatient', mayDoNow: LEVEL_2, notKnown: [] },
			true,
			'chair, bathroom one helper · corridor, stairs not'
		],
		[
			{ phase: 'inpatient', mayDoNow: LEVEL_2, notKnown: ['operation'] },
			true,
			'Not known: operation and precautions; find out first · chair, bathroom one helper · corridor, stairs not'
		],
		[{ phase: 'inpatient', mayDoNow: null, notKnown: [] }, false, 'Levels count from the operation'],
		[{ phase: 'outpatient', mayDoNow: null, notKnown: [] }, false, 'Exercise in the programme, supervised'],
		// No permission stands beside what is missing.
		[
			{ phase: 'outpatient', mayDoNow: null, notKnown: ['operation', 'drug', 'rhythm'] },
			true,
			'Not known: operation and precautions, rate-slowing drug, rhythm; find out before any exercise'
		]
	])('%#: %s', (of, brief, words) => {
		expect(mayDoWords(of, brief).join(' · ')).toBe(words);
	});
});
