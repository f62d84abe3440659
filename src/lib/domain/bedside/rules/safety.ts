/**
 * Who may do what. A patient who is not conscious or does not follow commands gets the passive set only. Coughing
 * with a splint is for patients who are awake and oriented. The spirometer is for patients who breathe through
 * the mouth, once the tube is out. Nobody takes stairs without somebody beside them. And whether a rate-slowing
 * drug is taken is asked in every session: where nobody knows it, the limits for those who take one hold.
 */
import type { ActivityCode } from '../activities/codes';
import type { Context } from '../forms';
import { cite } from '../limits/sources';
import { withoutLimit, type Done, type Facts, type Rule } from './rule';

const SOURCE = cite('common-practice');

/** True when the patient cannot be asked to do anything. What is not stated of a conscious patient is no refusal. */
function cannotFollow({ conscious, followsCommands }: Context): boolean {
	return !conscious || followsCommands === false;
}

export const notFollowing: Rule = {
	id: 'not-following',
	words: 'A patient who is not conscious or does not follow commands gets the passive set only.',
	sources: ['common-practice'],
	judge: ({ context, activities, stage }) => {
		const active = activities.filter(({ activity }) => activity.mode === 'active');
		return (cannotFollow(context) ? active : []).map(({ activity: { code, name } }) => {
			const reason = `${name} is active work, and the patient does not follow commands: the passive set only.`;
			return withoutLimit('not-following', 'stop', stage, code, reason, SOURCE);
		});
	},
	lacks: ({ context, activities }) =>
		context.conscious &&
		context.followsCommands == null &&
		activities.some(({ activity }) => activity.mode === 'active')
};

export const airway: Rule = {
	id: 'airway',
	words:
		'Coughing is for patients who are awake and oriented; the spirometer only once the tube is out and the patient breathes through the mouth.',
	sources: ['common-practice'],
	judge: (facts) =>
		facts.activities.flatMap(({ activity: { code, name } }) => {
			const why = airwayBar(facts, code);
			const reason = `${name}: ${why}.`;
			return why === null ? [] : [withoutLimit('airway', 'stop', facts.stage, code, reason, SOURCE)];
		}),
	lacks: ({ context, activities }) =>
		context.airway == null && activities.some(({ activity }) => activity.code === 'incentive-spirometer')
};

function airwayBar(facts: Facts, code: ActivityCode): string | null {
	if (code === 'splinted-cough') {
		return coughBar(facts);
	}
	return code === 'incentive-spirometer' ? tubeBar(facts) : null;
}

function coughBar({ context, symptoms }: Facts): string | null {
	const confused = symptoms.some(({ code }) => code === 'confusion');
	return cannotFollow(context) || confused ? 'only for a patient who is awake and oriented' : null;
}

function tubeBar({ context }: Facts): string | null {
	const tubed = context.airway === 'tube' || context.airway === 'tracheostomy';
	return tubed ? 'only once the tube is out and the patient breathes through the mouth' : null;
}

export const helperMissing: Rule = {
	id: 'helper-missing',
	words: 'Stairs are taken with somebody beside the patient.',
	sources: ['common-practice'],
	judge: ({ activities, stage }) =>
		activities
			.filter((done) => done.activity.stairs && !isHelped(done))
			.map(({ activity: { code, name } }) => {
				const reason = `${name}: nobody is recorded as being beside the patient.`;
				return withoutLimit('helper-missing', 'caution', stage, code, reason, SOURCE);
			}),
	lacks: () => false
};

function isHelped({ done: { assistance, helper } }: Done): boolean {
	return assistance === 'one' || assistance === 'two' || Boolean(helper);
}

export const betaBlockerUnknown: Rule = {
	id: 'beta-blocker-unknown',
	words: 'Where nobody knows whether a rate-slowing drug is taken, the limits for those who take one hold.',
	sources: ['rate-slowing'],
	judge: ({ context, stage }) => {
		if (context.betaBlocked !== null) {
			return [];
		}
		const reason = 'Whether the patient takes a rate-slowing drug is not said today: judged as if so.';
		return [withoutLimit('beta-blocker-unknown', 'note', stage, null, reason, cite('rate-slowing'))];
	},
	lacks: () => false
};
