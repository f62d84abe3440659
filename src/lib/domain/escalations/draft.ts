/**
 * A call for help written from the record: situation, background, assessment, request. It is a proposal in plain
 * sentences for the person who raises it to read and change, so it states what was measured and judges nothing
 * beyond the findings. What is not on record is left out, never guessed.
 */
import type { FindingGrade } from '../bedside/codes';
import { isAboutTheDeed } from '../bedside/deed-rules';
import { plain } from '../bedside/numbers';
import type { Reading } from '../bedside/forms';
import type { SessionLine } from '../bedside/views';
import type { Approach, Grade, Rhythm } from '../core/codes';
import { parseRfc3339 } from '../core/instant';
import { localTimeOf, type Zone } from '../core/time';

/** Within how many minutes somebody is needed, proposed for a grade; null where the shift is enough. */
export const NEEDED_WITHIN: Readonly<Record<Grade, number | null>> = { high: 5, medium: 30, low: null };

/** What the nameboard knows of the patient. */
export interface DraftRecord {
	procedure: string | null;
	approach: Approach | null;
	postOpDay: number | null;
	level: number;
	/** On a rate-slowing drug; null when nobody knows. */
	betaBlocked: boolean | null;
	rhythm: Rhythm | null;
	/** How high an arm may be lifted now, degrees; null without a limit. */
	maxElevationDeg: number | null;
}

/** The recorded session that the call is about. */
export type DraftSession = Pick<
	SessionLine,
	'startedAt' | 'endedAt' | 'level' | 'outcome' | 'activities' | 'before' | 'during' | 'after' | 'findings'
>;

export interface EscalationDraft {
	/** A proposal; null without a session, where a person must choose. */
	grade: Grade | null;
	situation: string;
	background: string;
	assessment: string;
	request: string;
}

/** The most characters that one part of a call may have. */
export const PART_MAX = 2000;

/** What is asked for, by grade. */
export const REQUESTS: Readonly<Record<Grade, string>> = {
	high: 'Please come to the bedside now.',
	medium: 'Please come and look within half an hour.',
	low: 'Please look at this during your shift.'
};

/** Write the call. `session` is null when it is not about a recorded one; then only the background is known. */
export function draftEscalation(
	record: DraftRecord,
	session: DraftSession | null,
	zone: Zone
): EscalationDraft {
	const grade = session && proposedGrade(session);
	return {
		grade,
		situation: session ? fitted(situationOf(session, zone)) : '',
		background: fitted(backgroundOf(record)),
		assessment: session ? fitted(assessmentOf(session)) : '',
		request: grade ? REQUESTS[grade] : ''
	};
}

/**
 * High when the patient's own answer stopped the session, medium for whatever else was found or could not be
 * judged, low for a session without a finding. Common practice, no published source.
 */
function proposedGrade({ outcome, findings }: DraftSession): Grade {
	if (findings.some(({ grade, rule }) => grade === 'stop' && !isAboutTheDeed(rule))) {
		return 'high';
	}
	return outcome === 'clear' ? 'low' : 'medium';
}

function situationOf(session: DraftSession, zone: Zone): string[] {
	const [from, to] = [session.startedAt, session.endedAt].map((at) => localTimeOf(parseRfc3339(at), zone));
	const done = session.activities.map(({ name }) => name).join(', ') || 'Session at the bedside';
	const span = from === to ? `at ${from}` : `${from} to ${to}`;
	const what = notBegun(session) ? `Not begun: ${done.toLowerCase()}` : done;
	const head = `${what}, level ${session.level}, ${span}.`;
	const stops = reasonsOf(session, 'stop');
	return [head, ...(stops.length > 0 ? stops : reasonsOf(session, 'caution'))];
}

function backgroundOf(record: DraftRecord): string[] {
	const { procedure, approach, postOpDay, betaBlocked, rhythm, maxElevationDeg } = record;
	const how = approach === 'sternotomy' ? ' by sternotomy' : '';
	const day = postOpDay === null ? '' : `, day ${postOpDay}`;
	return [
		procedure === null ? '' : `${procedure}${how}${day}.`,
		`Level ${record.level}.`,
		DRUG_WORDS[`${betaBlocked}`],
		rhythm === null ? 'Rhythm not known.' : `Rhythm: ${RHYTHM_WORDS[rhythm]}.`,
		maxElevationDeg === null ? '' : `Arms to ${plain(maxElevationDeg)} degrees.`
	];
}

const DRUG_WORDS: Record<`${boolean | null}`, string> = {
	true: 'On a rate-slowing drug.',
	false: 'No rate-slowing drug.',
	null: 'Rate-slowing drug not known.'
};

const RHYTHM_WORDS: Record<Rhythm, string> = {
	sinus: 'sinus',
	'atrial-fibrillation': 'atrial fibrillation',
	paced: 'paced',
	other: 'other than sinus'
};

/** The readings in order, then what the situation does not say already. */
function assessmentOf(session: DraftSession): string[] {
	const { before, during, after } = session;
	const stopped = reasonsOf(session, 'stop').length > 0;
	return [
		`Before: ${readingWords(before)}.`,
		...during.map((reading, index) => `In effort (${index + 1}): ${readingWords(reading)}.`),
		...(notBegun(session) ? [] : [`After: ${readingWords(after)}.`]),
		...(stopped ? reasonsOf(session, 'caution') : []),
		...missingOf(session)
	];
}

/** What stopped before anything was begun has nothing to tell of effort, and nothing of it is missing. */
function notBegun({ during, after, findings }: DraftSession): boolean {
	const barred = findings.some(({ grade, reading }) => grade === 'stop' && reading === 'before');
	return barred && during.length === 0 && readingWords(after) === NOT_MEASURED;
}

const NOT_MEASURED = 'not measured';

/** `sitting, 108/66 mmHg, pulse 86, saturation 95 %`; what was not measured is left out. */
export function readingWords(reading: Reading): string {
	const { posture, sbp, dbp, hr, spo2, rr, rpe, pain, oxygenLpm } = reading;
	const values = [
		sbp != null ? `${plain(sbp)}/${dbp == null ? '–' : plain(dbp)} mmHg` : '',
		hr != null ? `pulse ${plain(hr)}` : '',
		spo2 != null ? `saturation ${plain(spo2)} %` : '',
		rr != null ? `breathing ${plain(rr)}/min` : '',
		rpe != null ? `exertion ${plain(rpe)} of 20` : '',
		pain != null ? `pain ${plain(pain)} of 10` : '',
		oxygenLpm != null ? `oxygen ${plain(oxygenLpm)} L/min` : ''
	].filter(Boolean);
	return values.length === 0 ? NOT_MEASURED : [posture, ...values].filter(Boolean).join(', ');
}

function reasonsOf({ findings }: DraftSession, grade: FindingGrade): string[] {
	return findings.filter((finding) => finding.grade === grade).map(({ reason }) => reason);
}

/** What was not measured: the reader must not take it as normal. Other notes stand in the background already. */
function missingOf(session: DraftSession): string[] {
	return session.findings
		.filter(({ rule, grade }) => rule === 'reading-missing' && grade === 'note')
		.filter(({ reading }) => reading === 'before' || !notBegun(session))
		.map(({ reason }) => reason);
}

/** Whole sentences while they fit; what does not is left to the session itself, and a mark says so. */
function fitted(sentences: readonly string[]): string {
	const more = ' More in the session.';
	let text = '';
	for (const sentence of sentences.filter(Boolean)) {
		const longer = text === '' ? sentence : `${text} ${sentence}`;
		if (longer.length > PART_MAX - more.length) {
			return `${text}${more}`;
		}
		text = longer;
	}
	return text;
}
