/**
 * Arms after a sternotomy. Until the arm stage is cleared an arm is lifted to 45 degrees at most, by the patient
 * or by somebody else: the wound does not know who lifts. Once it is cleared the limit of the clearance holds,
 * and 90 degrees where the clearance states none. A narrower limit that was set for the patient holds beside it: two
 * people said something about these arms, and the more careful word counts. Over the limit stops.
 */
import type { RuleFinding } from '../finding';
import { armLimitOf } from '../limits/arms';
import { crosses, type Limit } from '../limits/limits';
import { plain } from '../numbers';
import { granted } from './clearances';
import { overLimit, type Done, type Facts, type Rule } from './rule';

export const armElevation: Rule = {
	id: 'arm-elevation',
	words:
		'After a sternotomy an arm is not lifted, actively or passively, over the height allowed before the arm stage is cleared, nor over the limit of the clearance after it.',
	sources: [],
	judge: (facts) => {
		const limit = armLimit(facts);
		return limit === null ? [] : facts.activities.flatMap((done) => judgeHeight(facts, done, limit));
	},
	lacks: (facts) =>
		armLimit(facts) !== null &&
		facts.activities.some(({ activity, done }) => activity.arms && done.elevationDeg == null)
};

/** How high an arm may be lifted now, in degrees; null without a sternotomy, where the rule is silent. */
export function armLimit(facts: Facts): Limit | null {
	if (!facts.context.sternotomy) {
		return null;
	}
	return armLimitOf(facts.limits, granted(facts.context, 'arm-stage'));
}

function judgeHeight(facts: Facts, { activity, done }: Done, limit: Limit): RuleFinding[] {
	const height = done.elevationDeg;
	if (height == null || !crosses(limit, height)) {
		return [];
	}
	const until = granted(facts.context, 'arm-stage') === null ? ' until the arm stage is cleared' : '';
	const reason = `${activity.name}: an arm was lifted to ${plain(height)} degrees, over the limit of ${plain(limit.value)}${until}.`;
	return [overLimit('arm-elevation', 'stop', facts.stage, height, limit, reason)];
}
