import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { BOUNDS, pulsePressureNeedsConfirming, type BoundedField } from '$lib/domain/bedside/bounds';
import { m } from '$lib/i18n/paraglide/messages';
import { doseFieldsOf, pressuresAreSwapped } from './assessment';
import type { DraftReading, Place, SessionDraft } from './draft';
import { doubtWords, faultWords, READING_FIELDS, valueOf } from './fields';
import { FIELD_LABELS, MOMENT_LABELS } from './words';

/** Something that stands in the way of recording: what, in words, and the element to lead to. */
export interface Obstacle {
	id: string;
	words: string;
}

/** The element of a field of a reading. */
export function readingFieldId(place: Place, field: string): string {
	return `${place.moment}-${place.moment === 'during' ? place.index : 0}-${field}`;
}

/** Everything that must be answered, corrected or confirmed before the session can be recorded, in page order. */
export function obstaclesOf(draft: SessionDraft): Obstacle[] {
	return [
		...nothingYet(draft),
		...openQuestions(draft),
		...fieldObstacles(
			'temperature',
			draft.temperature,
			draft.confirmed,
			'temperature',
			m.bedside_temperature()
		),
		...draft.activities.flatMap(({ code, texts, confirmed }) =>
			doseFieldsOf(activityByCode(code)).flatMap((field) =>
				fieldObstacles(field, texts[field] ?? '', confirmed, `${code}-${field}`, activityByCode(code).name)
			)
		),
		...readingObstacles({ moment: 'before' }, draft.before),
		...draft.during.flatMap((reading, index) => readingObstacles({ moment: 'during', index }, reading)),
		...readingObstacles({ moment: 'after' }, draft.after)
	];
}

/** One press must not put a session on record in which nothing was done, measured or felt. */
function nothingYet({ activities, before, during, after, symptoms, temperature }: SessionDraft): Obstacle[] {
	const typed = [before, ...during, after].some(({ texts }) => Object.values(texts).some(isTyped));
	const empty = activities.length === 0 && symptoms.length === 0 && !typed && !isTyped(temperature);
	return empty ? [{ id: 'activities', words: m.bedside_nothing_yet() }] : [];
}

const isTyped = (text: string) => text.trim() !== '';

function openQuestions({ drug, rhythm, responds }: SessionDraft): Obstacle[] {
	return [
		...(responds === null ? [{ id: 'responds', words: m.bedside_responds_open() }] : []),
		...(drug === null ? [{ id: 'drug', words: m.bedside_drug_open() }] : []),
		...(rhythm === null ? [{ id: 'rhythm', words: m.bedside_rhythm_open() }] : [])
	];
}

/** Questions that may stay open when a session is recorded, and are then said not to have been answered. */
export function unansweredOf({
	startChecks,
	noStartChecks,
	activities,
	airway
}: Pick<SessionDraft, 'startChecks' | 'noStartChecks' | 'activities' | 'airway'>): string[] {
	const looked = noStartChecks || startChecks.length > 0;
	const needsAirway = activities.some(({ code }) => code === 'incentive-spirometer');
	return [
		...(looked ? [] : [m.bedside_start_not_asked()]),
		...(needsAirway && airway === null ? [m.bedside_airway_open()] : [])
	];
}

function readingObstacles(place: Place, reading: DraftReading): Obstacle[] {
	const moment = MOMENT_LABELS[place.moment]();
	const fields = READING_FIELDS.flatMap((field) =>
		fieldObstacles(
			field,
			reading.texts[field] ?? '',
			reading.confirmed,
			readingFieldId(place, field),
			`${moment}, ${FIELD_LABELS[field]()}`
		)
	);
	const pressures = pressureFault(reading) ?? pressureDoubt(reading);
	return pressures === null
		? fields
		: [...fields, { id: readingFieldId(place, 'dbp'), words: `${moment}: ${pressures}` }];
}

function fieldObstacles(
	field: BoundedField,
	text: string,
	confirmed: readonly string[],
	id: string,
	name: string
): Obstacle[] {
	const words = faultWords(field, text) ?? openDoubt(field, text, confirmed);
	return words === null ? [] : [{ id, words: `${name}: ${words}` }];
}

/** The question about a doubtful value, unless it was answered for just this value. */
export function openDoubt(field: BoundedField, text: string, confirmed: readonly string[]): string | null {
	return confirmed.includes(confirmation(field, text)) ? null : doubtWords(field, text);
}

/** What is kept when a person says 'yes, really': the field with its text, so that another value is asked anew. */
export function confirmation(field: BoundedField | 'pressures', text: string): string {
	return `${field} ${text.trim()}`;
}

/** Why the two pressures of a reading cannot both be right; null when they can. */
export function pressureFault(reading: Pick<DraftReading, 'texts'>): string | null {
	const { sbp, dbp } = pressures(reading);
	return pressuresAreSwapped(reading) && sbp !== null && dbp !== null
		? m.bedside_pressures_swapped({ sbp, dbp })
		: null;
}

/** The question about two pressures that lie unusually near together or far apart; null when answered or none. */
export function pressureDoubt(reading: Pick<DraftReading, 'texts' | 'confirmed'>): string | null {
	const { sbp, dbp } = pressures(reading);
	if (sbp === null || dbp === null || sbp <= dbp || !pulsePressureNeedsConfirming(sbp, dbp)) {
		return null;
	}
	const answered = reading.confirmed.includes(confirmation('pressures', `${sbp}/${dbp}`));
	return answered ? null : m.bedside_pressures_doubt({ sbp, dbp, unit: BOUNDS.sbp.unit });
}

function pressures({ texts }: Pick<DraftReading, 'texts'>) {
	return { sbp: valueOf('sbp', texts.sbp), dbp: valueOf('dbp', texts.dbp) };
}
