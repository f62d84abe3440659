/** Sessions for tests: complete and in order, so that a test states only what it is about. */
import { assess } from '../assess';
import type { Finding, Verdict } from '../finding';
import type { Assessment, Context, Reading } from '../forms';

export const REST: Reading = {
	posture: 'sitting',
	bpSource: 'cuff',
	hr: 78,
	sbp: 120,
	dbp: 72,
	spo2: 97,
	rr: 16,
	pain: 1
};

/** What a test moves one at a time. */
export type ReadingField = 'hr' | 'sbp' | 'dbp' | 'spo2' | 'rr' | 'rpe' | 'pain';

/** A reading with one value changed, and the other pressure moved so that the pair stays possible. */
export function readingWith(field: ReadingField, value: number): Reading {
	if (field === 'sbp') {
		return { ...REST, sbp: value, dbp: Math.min(72, value - 1) };
	}
	return { ...REST, [field]: value, ...(field === 'dbp' ? { sbp: Math.max(120, value + 10) } : {}) };
}

export const CONTEXT: Context = {
	betaBlocked: false,
	rhythm: 'sinus',
	sternotomy: true,
	level: 3,
	conscious: true,
	followsCommands: true,
	airway: 'none',
	vasopressorRising: false,
	balloonPump: false,
	pacingDependent: false,
	bleeding: false,
	temperature: 36.8,
	clearances: []
};

/** The parts of a session a test wants otherwise. Readings are laid over a complete one, field by field. */
export interface Changes {
	context?: Partial<Context>;
	before?: Reading;
	during?: Reading[];
	after?: Reading;
	symptoms?: Assessment['symptoms'];
	activities?: Assessment['activities'];
}

/** A session in which every rule can be judged and none has anything to say, with the changes laid over it. */
export function session(changes: Changes = {}): Assessment {
	return {
		context: { ...CONTEXT, ...changes.context },
		before: { ...REST, ...changes.before },
		during: changes.during ?? [
			{ ...REST, hr: 86, sbp: 124, rpe: 10, work: 1 },
			{ ...REST, hr: 90, sbp: 126, rpe: 11, work: 2 }
		],
		after: { ...REST, hr: 84, sbp: 122, ...changes.after },
		symptoms: changes.symptoms ?? [],
		activities: changes.activities ?? []
	};
}

/** What the default limits make of a session with these changes. */
export function judge(changes: Changes = {}): Verdict {
	return assess(session(changes));
}

/** The findings of one rule as `grade reading`, in order. */
export function grades({ findings }: Verdict, rule: Finding['rule']): string[] {
	return findings
		.filter((finding) => finding.rule === rule)
		.map(({ grade, reading }) => `${grade} ${reading}`);
}

/** The only finding of a rule; throws when there is none or more than one. */
export function only({ findings }: Verdict, rule: Finding['rule']): Finding {
	const [found, ...more] = findings.filter((finding) => finding.rule === rule);
	if (found === undefined || more.length > 0) {
		throw new Error(`Expected one finding of '${rule}', found ${found === undefined ? 0 : more.length + 1}.`);
	}
	return found;
}
