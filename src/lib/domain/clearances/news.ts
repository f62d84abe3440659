import type { ShownEvidence } from './views';

/** What of the evidence can change under a decider, besides sessions and calls for help. */
export const CHANGEABLE = ['operation', 'wound', 'lines', 'oxygen', 'level', 'heart', 'precautions'] as const;
export type Changeable = (typeof CHANGEABLE)[number];

/** What stands in newer evidence and not in older. */
export interface EvidenceNews {
	/** Sessions that were not there, or were amended since. */
	sessions: number;
	/** Calls for help that were not there, or have ended since. */
	escalations: number;
	changed: Changeable[];
}

const BETWEEN = '|';

/**
 * What somebody was shown, as one line that a form carries: a mark for each thing that can change under them. It is
 * compared by content and not by time, because two writes of the same instant have no order.
 */
export function marksOf(evidence: ShownEvidence): string {
	return [...facts(evidence), ...sessionMarks(evidence), ...escalationMarks(evidence)].join(BETWEEN);
}

/**
 * What a person has not been shown yet; null when nothing.
 * @param shown what they were shown, from {@link marksOf}
 * @param evidence as it is now, and as this person may see it
 */
export function newsSince(shown: string, evidence: ShownEvidence): EvidenceNews | null {
	const seen = new Set(shown.split(BETWEEN));
	const unseen = (marks: string[]) => marks.filter((mark) => !seen.has(mark));
	const changed = unseen(facts(evidence)).map((mark) => mark.split(':')[0]);
	const news = {
		sessions: unseen(sessionMarks(evidence)).length,
		escalations: unseen(escalationMarks(evidence)).length,
		changed: CHANGEABLE.filter((fact) => changed.includes(fact))
	};
	return news.sessions + news.escalations + news.changed.length > 0 ? news : null;
}

/** The day after the operation is left out: it turns at midnight without anything having happened. */
function facts({ procedure, approach, operatedOn, wound, level, ...rest }: ShownEvidence): string[] {
	const { betaBlocked, rhythm, precautions, lines = [], oxygen } = rest;
	return [
		mark('operation', procedure, approach, operatedOn),
		mark('wound', wound?.at, wound?.wound, wound?.sternum),
		mark('lines', ...lines),
		// The same flow said again is nothing new.
		mark('oxygen', oxygen?.lpm),
		mark('level', level),
		mark('heart', betaBlocked, rhythm),
		mark(
			'precautions',
			precautions?.basis,
			precautions?.sternal,
			precautions?.maxElevationDeg,
			precautions?.maxLoadKg
		)
	];
}

function sessionMarks({ sessions }: ShownEvidence): string[] {
	return (sessions ?? []).map(({ id, amendments = [] }) => mark('session', id, amendments.length));
}

/** Who has taken it does not matter to a decision; whether it is over does. */
function escalationMarks({ escalations }: ShownEvidence): string[] {
	return (escalations ?? []).map(({ id, state }) =>
		mark('escalation', id, state === 'raised' || state === 'taken' ? 'open' : 'over')
	);
}

function mark(name: string, ...values: (string | number | boolean | null | undefined)[]): string {
	return [name, ...values.map((value) => encodeURIComponent(`${value ?? ''}`))].join(':');
}
