/**
 * Rhythm. A rhythm other than the one before the session stops: it may be the first sign of trouble, and nobody
 * has judged it yet. In atrial fibrillation, pacing or another irregular rhythm the heart rate answers to work
 * badly or not at all, so the rise of the heart rate cautions at most and a note says why; pressure and
 * exertion are then needed to judge the session (`missing.ts` asks for them).
 */
import type { Rhythm } from '../../core/codes';
import { cite } from '../limits/sources';
import { withoutLimit, MOMENT_WORDS, type Facts, type Rule } from './rule';

const RHYTHM_WORDS: Record<Rhythm, string> = {
	sinus: 'sinus rhythm',
	'atrial-fibrillation': 'atrial fibrillation',
	paced: 'a paced rhythm',
	other: 'another rhythm'
};

/** True for every rhythm in which the pulse rules say little. */
export function isIrregular(rhythm: Rhythm): boolean {
	return rhythm !== 'sinus';
}

/** True when any reading of the session was taken in such a rhythm. */
export function sessionIsIrregular({ context, readings }: Facts): boolean {
	return isIrregular(context.rhythm) || readings.some(({ rhythm }) => isIrregular(rhythm));
}

export const newRhythm: Rule = {
	id: 'new-rhythm',
	words: 'A rhythm other than the one before is a reason to stop.',
	sources: ['inpatient-stop'],
	judge: ({ context, before, during, after }) =>
		[[before], during, [after]].flatMap((readings) => {
			const known = readings[0] === before ? context.rhythm : before.rhythm;
			const changed = readings.find(({ rhythm }) => rhythm !== known);
			if (changed === undefined) {
				return [];
			}
			const reason = `The rhythm ${MOMENT_WORDS[changed.moment]} is ${RHYTHM_WORDS[changed.rhythm]}; it was ${RHYTHM_WORDS[known]}.`;
			return [
				withoutLimit('new-rhythm', 'stop', changed.moment, changed.rhythm, reason, cite('inpatient-stop'))
			];
		}),
	lacks: () => false
};

export const rhythmCaveat: Rule = {
	id: 'rhythm-caveat',
	words:
		'In atrial fibrillation, pacing or another irregular rhythm the pulse rules say little: pressure, exertion and symptoms decide.',
	sources: ['postoperative-rhythm'],
	judge: (facts) => {
		if (!sessionIsIrregular(facts)) {
			return [];
		}
		const { context, readings } = facts;
		const rhythm = readings.find((placed) => isIrregular(placed.rhythm))?.rhythm ?? context.rhythm;
		const reason = `In ${RHYTHM_WORDS[rhythm]} the heart rate is a poor guide to effort, so its rise cautions at most. Go by pressure, exertion and symptoms.`;
		return [withoutLimit('rhythm-caveat', 'note', facts.stage, rhythm, reason, cite('postoperative-rhythm'))];
	},
	lacks: () => false
};
