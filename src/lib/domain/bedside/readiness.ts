/**
 * Before daily walking begins: no new or recurrent chest pain for 8 hours, no new sign that the heart is failing,
 * no new significant rhythm or change of the tracing for 8 hours. What nobody has said is not ready: a question
 * that was not asked has no good answer. Before the first level with walking the advice on the level holds a patient
 * back for what happened, and puts what is open as a question; asking it is the therapist's.
 *
 * Chest pain and rhythm over 8 hours: inpatient limits of the ACSM line, as given in study notes. The rest:
 * AACVPR guidelines, from memory, not yet verified.
 */
export const CALM_HOURS_BEFORE_WALKING = 8;

const CHECKS = ['chestPain', 'heartFailureSigns', 'newRhythm'] as const;

/** Each answer is true (it happened), false (it did not), or null (nobody has said). */
export type WalkingChecks = Readonly<Record<(typeof CHECKS)[number], boolean | null>>;

export interface Readiness {
	readonly ready: boolean;
	/** What happened, and so speaks against it. */
	readonly against: readonly string[];
	/** What is still to be asked. */
	readonly open: readonly string[];
}

const HAPPENED: Record<keyof WalkingChecks, string> = {
	chestPain: `Before daily walking: there was chest pain within ${CALM_HOURS_BEFORE_WALKING} hours.`,
	heartFailureSigns: 'Before daily walking: there are new signs that the heart is failing.',
	newRhythm: `Before daily walking: there was a new rhythm or a change of the tracing within ${CALM_HOURS_BEFORE_WALKING} hours.`
};

const NOT_SAID: Record<keyof WalkingChecks, string> = {
	chestPain: `Before daily walking, ask: any chest pain within ${CALM_HOURS_BEFORE_WALKING} hours?`,
	heartFailureSigns: 'Before daily walking, ask: any new sign that the heart is failing?',
	newRhythm: `Before daily walking, ask: any new rhythm or change of the tracing within ${CALM_HOURS_BEFORE_WALKING} hours?`
};

/** May daily walking begin? */
export function readyToWalk(checks: WalkingChecks): Readiness {
	const against = CHECKS.filter((check) => checks[check]).map((check) => HAPPENED[check]);
	const open = CHECKS.filter((check) => checks[check] === null).map((check) => NOT_SAID[check]);
	return { ready: against.length + open.length === 0, against, open };
}
