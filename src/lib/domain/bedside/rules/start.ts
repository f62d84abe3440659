/**
 * What bars a start whatever the readings are: a vasopressor that is being raised, a balloon pump, a rhythm that
 * depends on temporary pacing, bleeding that is not controlled, and fever. What nobody stated about these is not
 * taken as absent.
 */
import type { Context } from '../forms';
import { crosses } from '../limits/limits';
import { cite } from '../limits/sources';
import { plain } from '../numbers';
import { CROSSING_WORDS, limitOf, overLimit, withoutLimit, type Rule } from './rule';

const BARS = [
	['vasopressorRising', 'A vasopressor is being raised'],
	['balloonPump', 'A balloon pump is in place'],
	['pacingDependent', 'The rhythm depends on temporary pacing'],
	['bleeding', 'There is bleeding that is not controlled']
] as const satisfies readonly (readonly [keyof Context, string])[];

export const startCheck: Rule = {
	id: 'start-check',
	words:
		'No session starts while a vasopressor is being raised, with a balloon pump, in a rhythm that depends on temporary pacing, or with bleeding.',
	sources: ['early-mobilisation'],
	judge: ({ context }) =>
		BARS.filter(([field]) => context[field] === true).map(([field, words]) =>
			withoutLimit('start-check', 'stop', 'before', field, `${words}.`, cite('early-mobilisation'))
		),
	lacks: ({ context }) => BARS.some(([field]) => context[field] == null)
};

export const temperatureCeiling: Rule = {
	id: 'temperature-ceiling',
	words: 'No session starts with a high fever, and only with caution with a slight one.',
	sources: [],
	judge: (facts) => {
		const { temperature } = facts.context;
		for (const [grade, key] of [
			['stop', 'temperature-ceiling'],
			['caution', 'temperature-ceiling.caution']
		] as const) {
			const limit = limitOf(facts, key);
			if (temperature != null && limit && crosses(limit, temperature)) {
				const reason = `The temperature is ${plain(temperature)} ${limit.unit}, ${CROSSING_WORDS[limit.when]} the limit of ${plain(limit.value)}.`;
				return [overLimit('temperature-ceiling', grade, 'before', temperature, limit, reason)];
			}
		}
		return [];
	},
	lacks: ({ context }) => context.temperature == null
};
