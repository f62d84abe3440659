/**
 * A session while it is being written: what a person typed, as they typed it, so that a reload or a lost network
 * takes nothing away and a text that is no number is never taken for a missing one. Plain data, kept as JSON.
 */
import type { ActivityCode } from '$lib/domain/bedside/activities/codes';
import type { Airway, Posture, PressureSource, SymptomCode } from '$lib/domain/bedside/codes';
import type { SessionBody } from '$lib/domain/bedside/forms';
import type { Level, Rhythm } from '$lib/domain/core/codes';
import type { ReadingField } from './fields';
import type { BedsideRecord } from './record';

/** Raise it when the shape changes: what an older page kept is then left alone instead of misread. */
const VERSION = 1;

export interface DraftReading {
	texts: Partial<Record<ReadingField, string>>;
	/** The texts that a person confirmed after being asked 'really?'. */
	confirmed: string[];
	posture: Posture | null;
	bpSource: PressureSource | null;
	rhythm: Rhythm | null;
	settled: boolean;
	/** When the first value was typed, milliseconds UTC. */
	at: number | null;
}

export const DOSE_FIELDS = ['elevationDeg', 'distanceM', 'minutes', 'repetitions', 'steps', 'balls'] as const;
export type DoseField = (typeof DOSE_FIELDS)[number];

export interface DraftActivity {
	code: ActivityCode;
	texts: Partial<Record<DoseField, string>>;
	confirmed: string[];
	/** Somebody stood beside the patient. */
	helper: boolean;
}

/** What bars a start, whatever the readings are. */
export const START_CHECKS = ['vasopressorRising', 'balloonPump', 'pacingDependent', 'bleeding'] as const;
export type StartCheck = (typeof START_CHECKS)[number];

/** Whether the patient is awake and does what one asks; the two answers as one question. */
export const RESPONSES = ['follows', 'awake', 'unconscious'] as const;
export type Response = (typeof RESPONSES)[number];

export const DRUG_ANSWERS = ['yes', 'no', 'unknown'] as const;
export type DrugAnswer = (typeof DRUG_ANSWERS)[number];

export interface SessionDraft {
	version: typeof VERSION;
	/** Names this one session however often it is sent. */
	key: string;
	startedAt: number | null;
	level: Level;
	/** A rate-slowing drug today; null until it is answered. */
	drug: DrugAnswer | null;
	rhythm: Rhythm | null;
	/** Where it is not the one on record: somebody says that it was known already. Missing in what was kept before. */
	rhythmKnown?: boolean | null;
	responds: Response | null;
	airway: Airway | null;
	startChecks: StartCheck[];
	/** Somebody looked, and none of the start checks holds. */
	noStartChecks: boolean;
	temperature: string;
	/** The texts outside readings and activities that a person confirmed. */
	confirmed: string[];
	activities: DraftActivity[];
	before: DraftReading;
	during: DraftReading[];
	after: DraftReading;
	symptoms: SymptomCode[];
	/** 1 to 4, null where it is not graded. */
	breathlessness: number | null;
	deviation: { reason: string; verbalFrom: string; readBack: boolean };
	/** Sent, and no answer came yet: it may have arrived, so it is sent again exactly as it was. */
	sent: { body: SessionBody; at: number } | null;
}

export type Place = { moment: 'before' | 'after' } | { moment: 'during'; index: number };

export function newReading(posture: Posture | null = null): DraftReading {
	return { texts: {}, confirmed: [], posture, bpSource: null, rhythm: null, settled: false, at: null };
}

/**
 * An empty session. The level of the record is proposed; what is asked each time is open, though the record knows it:
 * a drug is begun and left off between two sessions, and an answer that nobody gave today is none.
 */
export function newDraft(record: BedsideRecord, key: string): SessionDraft {
	return {
		version: VERSION,
		key,
		startedAt: null,
		level: record.level,
		drug: null,
		rhythm: null,
		rhythmKnown: null,
		responds: null,
		airway: null,
		startChecks: [],
		noStartChecks: false,
		temperature: '',
		confirmed: [],
		activities: [],
		before: newReading(),
		during: [],
		after: newReading(),
		symptoms: [],
		breathlessness: null,
		deviation: { reason: '', verbalFrom: '', readBack: false },
		sent: null
	};
}

/** What was kept, or null when nothing was, or it is of another version. */
export function readDraft(kept: string | null): SessionDraft | null {
	try {
		const draft = JSON.parse(kept ?? 'null') as SessionDraft | null;
		return draft?.version === VERSION ? draft : null;
	} catch {
		return null;
	}
}

/** The reading at a place; null for a place that is not there. */
export function readingAt(draft: SessionDraft, place: Place): DraftReading | null {
	return place.moment === 'during' ? (draft.during[place.index] ?? null) : draft[place.moment];
}

/** True when something was typed into the reading. */
export function isTouched({ texts }: DraftReading): boolean {
	return Object.values(texts).some((text) => text.trim() !== '');
}

/**
 * Make room for another measurement after a stop, and say where it goes. Nothing typed is lost: a reading after
 * effort becomes the last one in effort. Before the session there is one reading only, which is then typed anew.
 */
export function measureAgain(draft: SessionDraft): Place {
	const begun = isTouched(draft.after) || draft.during.some(isTouched);
	if (!begun) {
		return { moment: 'before' };
	}
	if (isTouched(draft.after)) {
		draft.during.push(draft.after);
		draft.after = newReading('sitting');
	}
	return { moment: 'after' };
}
