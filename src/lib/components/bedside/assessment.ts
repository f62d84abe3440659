/** From what is typed to what the rules judge and the server stores. */
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import type { Activity } from '$lib/domain/bedside/activities/activity';
import type {
	ActivityDone,
	Assessment,
	Context,
	Reading,
	SessionBody,
	Symptom
} from '$lib/domain/bedside/forms';
import { lackingClearance } from '$lib/domain/bedside/rules/clearances';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { toRfc3339 } from '$lib/domain/core/instant';
import {
	START_CHECKS,
	type DoseField,
	type DraftActivity,
	type DraftReading,
	type Response,
	type SessionDraft
} from './draft';
import { READING_FIELDS, valueOf, type ReadingField } from './fields';
import type { BedsideRecord } from './record';

/** How much of an activity is asked for: the height of arms, the length of a walk, else as its dose is given. */
export function doseFieldsOf({ code, arms, stairs, walking, dose }: Activity): DoseField[] {
	if (code === 'incentive-spirometer') {
		return ['balls', 'repetitions'];
	}
	if (arms) {
		return ['elevationDeg', 'repetitions'];
	}
	if (stairs) {
		return ['steps'];
	}
	if (walking) {
		return ['distanceM', 'minutes'];
	}
	return [
		...(dose.minutes ? ['minutes' as const] : []),
		...(dose.repetitions ? ['repetitions' as const] : [])
	];
}

/**
 * What the rules judge while somebody types. A value that cannot be true is left out, as are two pressures of
 * which the systolic is not above the diastolic. Questions that are still open are judged at their strictest:
 * the drug as taken, the rhythm as one in which the pulse counts, the patient as awake; none of it is saved so.
 */
export function toAssessment(draft: SessionDraft, record: BedsideRecord): Assessment {
	return {
		context: contextOf(draft, record),
		before: { ...toReading(draft.before), ...(rhythmIsNew(draft, record) ? { rhythm: draft.rhythm } : {}) },
		during: draft.during.map(toReading),
		after: toReading(draft.after),
		symptoms: draft.symptoms.map((code) => toSymptom(code, draft.breathlessness)),
		activities: draft.activities.map(toActivity)
	};
}

/** The body of `POST /api/episodes/:id/sessions`. `now` ends the session, milliseconds UTC. */
export function toBody(draft: SessionDraft, record: BedsideRecord, now: number): SessionBody {
	const { reason, verbalFrom, readBack } = draft.deviation;
	const lacking = lackingOf(draft, record).length > 0;
	return {
		...toAssessment(draft, record),
		level: draft.level,
		startedAt: toRfc3339(Math.min(draft.startedAt ?? now, now)),
		endedAt: toRfc3339(now),
		deviation:
			lacking && reason.trim() !== '' ? { reason, verbalFrom: verbalFrom.trim() || null, readBack } : null
	};
}

/** The clearances that what is chosen still lacks, each once. */
export function lackingOf(
	{ activities }: Pick<SessionDraft, 'activities'>,
	record: BedsideRecord
): ClearanceKind[] {
	const kinds = activities.map(({ code }) => lackingClearance(record, activityByCode(code)));
	return [...new Set(kinds.filter((kind) => kind !== null))];
}

/** True where today's rhythm is not the one on record. */
export function rhythmDiffers({ rhythm }: Pick<SessionDraft, 'rhythm'>, record: BedsideRecord): boolean {
	return rhythm !== null && record.rhythm !== null && rhythm !== record.rhythm;
}

/** Another rhythm than the one on record is judged as new until somebody says that it was known already. */
export function rhythmIsNew(
	draft: Pick<SessionDraft, 'rhythm' | 'rhythmKnown'>,
	record: BedsideRecord
): boolean {
	return rhythmDiffers(draft, record) && draft.rhythmKnown !== true;
}

/** A reading with the values that may be judged. */
export function toReading(draft: DraftReading): Reading {
	const { posture, bpSource, rhythm, settled, at } = draft;
	const values: Partial<Record<ReadingField, number>> = {};
	for (const field of READING_FIELDS) {
		const value = valueOf(field, draft.texts[field]);
		if (value !== null) {
			values[field] = value;
		}
	}
	if (pressuresAreSwapped(draft)) {
		delete values.sbp;
		delete values.dbp;
	}
	return {
		...values,
		...(posture ? { posture } : {}),
		...(bpSource ? { bpSource } : {}),
		...(rhythm ? { rhythm } : {}),
		...(settled ? { settled } : {}),
		...(at === null ? {} : { at: toRfc3339(at) })
	};
}

/** True when both pressures are there and the systolic is not above the diastolic. */
export function pressuresAreSwapped({ texts }: Pick<DraftReading, 'texts'>): boolean {
	const [sbp, dbp] = [valueOf('sbp', texts.sbp), valueOf('dbp', texts.dbp)];
	return sbp !== null && dbp !== null && sbp <= dbp;
}

function contextOf(draft: SessionDraft, record: BedsideRecord): Context {
	const checks = START_CHECKS.map((check) => [
		check,
		draft.startChecks.includes(check) ? true : draft.noStartChecks ? false : null
	]);
	return {
		phase: record.phase,
		betaBlocked: draft.drug === 'no' ? false : draft.drug === 'yes' ? true : null,
		rhythm: (rhythmIsNew(draft, record) ? record.rhythm : draft.rhythm) ?? 'sinus',
		sternotomy: record.sternotomy,
		level: draft.level,
		...RESPONSE_FACTS[draft.responds ?? 'open'],
		airway: draft.airway,
		temperature: valueOf('temperature', draft.temperature),
		clearances: record.clearances,
		...(Object.fromEntries(checks) as Record<(typeof START_CHECKS)[number], boolean | null>)
	};
}

const RESPONSE_FACTS: Record<Response | 'open', { conscious: boolean; followsCommands: boolean | null }> = {
	follows: { conscious: true, followsCommands: true },
	awake: { conscious: true, followsCommands: false },
	unconscious: { conscious: false, followsCommands: false },
	open: { conscious: true, followsCommands: null }
};

function toSymptom(code: SessionDraft['symptoms'][number], breathlessness: number | null): Symptom {
	return code === 'breathlessness' && breathlessness !== null ? { code, grade: breathlessness } : code;
}

function toActivity({ code, texts, helper }: DraftActivity): ActivityDone {
	const activity = activityByCode(code);
	const doses = doseFieldsOf(activity)
		.map((field) => [field, valueOf(field, texts[field])] as const)
		.filter(([, value]) => value !== null);
	return { code, ...Object.fromEntries(doses), ...(activity.stairs ? { helper } : {}) };
}
