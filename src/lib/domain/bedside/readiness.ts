/**
 * Before daily walking begins: no new or recurrent chest pain for 8 hours, no new sign that the heart is failing,
 * no new significant rhythm or change of the tracing for 8 hours. What nobody has said is not ready: a question
 * that was not asked has no good answer.
 *
 * Chest pain and rhythm over 8 hours: inpatient limits of the ACSM line, as given in study notes. The rest:
 * AACVPR guidelines, from memory, not yet verified.
 */
export const CALM_HOURS_BEFORE_WALKING = 8;

/** Each answer is true (it happened), false (it did not), or null (nobody has said). */
export interface WalkingChecks {
	readonly chestPain: boolean | null;
	readonly heartFailureSigns: boolean | null;
	readonly newRhythm: boolean | null;
}

export interface Readiness {
	readonly ready: boolean;
	/** Why not; empty when ready. */
	readonly reasons: readonly string[];
}

const HAPPENED: Record<keyof WalkingChecks, string> = {
	chestPain: `Chest pain within the last ${CALM_HOURS_BEFORE_WALKING} hours.`,
	heartFailureSigns: 'New signs that the heart is failing.',
	newRhythm: `A new rhythm or a change of the tracing within the last ${CALM_HOURS_BEFORE_WALKING} hours.`
};

const NOT_SAID: Record<keyof WalkingChecks, string> = {
	chestPain: 'Nobody has said whether there was chest pain.',
	heartFailureSigns: 'Nobody has said whether there are signs that the heart is failing.',
	newRhythm: 'Nobody has said whether the rhythm has changed.'
};

/** May daily walking begin? */
export function readyToWalk(checks: WalkingChecks): Readiness {
	const reasons = (['chestPain', 'heartFailureSigns', 'newRhythm'] as const).flatMap((check) => {
		if (checks[check] === null) {
			return [NOT_SAID[check]];
		}
		return checks[check] ? [HAPPENED[check]] : [];
	});
	return { ready: reasons.length === 0, reasons };
}
