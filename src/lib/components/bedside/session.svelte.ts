import { assess } from '$lib/domain/bedside/assess';
import { isAboutTheDeed } from '$lib/domain/bedside/deed-rules';
import type { Finding } from '$lib/domain/bedside/finding';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { lackingOf, toAssessment, toBody } from './assessment';
import { isTouched, measureAgain, newDraft, type Place, type SessionDraft } from './draft';
import { obstaclesOf, unansweredOf } from './obstacles';
import { duringIndexOf, placeOf, type FindingPlace } from './places';
import type { BedsideRecord } from './record';

/** A finding with the reading in effort that it speaks of. */
type Placed = Finding & { index: number | null };

/**
 * The session on the page: what is typed, and what the rules make of it at every keystroke. The record is read
 * through a function, because it changes while somebody stands at the bedside: a clearance may be given meanwhile.
 */
export class BedsideSession {
	draft: SessionDraft;
	readonly #record: () => BedsideRecord;
	readonly #now: () => number;

	/** @param now the server's instant, milliseconds UTC */
	constructor(record: () => BedsideRecord, key: string, now: () => number) {
		this.#record = record;
		this.#now = now;
		this.draft = $state(newDraft(record(), key));
	}

	/** An outpatient exercises at a stated work: a stage, watts, a speed. */
	readonly inGym = $derived.by(() => this.#record().phase === 'outpatient');
	readonly assessment = $derived.by(() => toAssessment(this.draft, this.#record()));
	readonly verdict = $derived.by(() => assess(this.assessment, this.#record().limits));
	readonly obstacles = $derived.by(() => obstaclesOf(this.draft));
	readonly lacking = $derived.by(() => lackingOf(this.draft, this.#record()));
	readonly #placed = $derived.by(() =>
		this.verdict.findings.map((finding): Placed => ({
			...finding,
			index: duringIndexOf(finding, this.assessment)
		}))
	);

	/** The stops by the patient's own answer, or by what bars a start: those that change the page. */
	readonly stops = $derived.by(() =>
		this.verdict.findings.filter(({ grade, rule }) => grade === 'stop' && !isAboutTheDeed(rule))
	);
	/** Whether a stop bars the start, is happening, or has passed: measured again since, and nothing is felt. */
	readonly stopPhase = $derived.by(() => {
		if (this.stops.every(({ reading }) => reading === 'before')) {
			return 'before';
		}
		const goesOn = this.stops.some(({ reading, rule }) => reading === 'after' || rule === 'symptom');
		return goesOn || !isTouched(this.draft.after) ? 'now' : 'past';
	});
	/** Every stop, also of what is done or planned. */
	readonly allStops = $derived.by(() => this.verdict.findings.filter(({ grade }) => grade === 'stop'));
	/** What was not measured, and what nobody has answered: none of it is normal. */
	readonly missing = $derived.by(() => [
		...this.findingsAt('missing').map(({ reason }) => reason),
		...unansweredOf(this.draft)
	]);
	/** Rules that found nothing and could not be judged; one that found something was. */
	readonly notJudged = $derived.by(() =>
		this.verdict.notJudged.filter((rule) => this.verdict.findings.every((finding) => finding.rule !== rule))
	);
	/** Nothing was answered to, measured or chosen yet. */
	readonly untouched = $derived.by(() => this.draft.startedAt === null);

	findingsAt(part: FindingPlace): Finding[] {
		return this.#placed.filter((finding) => placeOf(finding) === part);
	}

	findingsOf(place: Place): Finding[] {
		return this.#placed.filter(
			({ reading, index }) =>
				reading === place.moment && (place.moment !== 'during' || index === null || index === place.index)
		);
	}

	/** The session begins with the first thing that is typed or chosen. */
	begin(): void {
		this.draft.startedAt ??= this.#now();
	}

	measureAgain(): Place {
		return measureAgain(this.draft);
	}

	/** What is sent: exactly what was sent before, where nobody knows whether that arrived. */
	body(): SessionBody {
		return (
			$state.snapshot(this.draft.sent?.body as SessionBody | undefined) ??
			toBody(this.draft, this.#record(), this.#now())
		);
	}

	/** Hold on to what is sent, and to nothing else, until there is an answer. */
	hold(body: SessionBody): void {
		this.draft.sent ??= { body, at: this.#now() };
	}

	/** The server said that nothing was recorded; it may be changed again. */
	release(): void {
		this.draft.sent = null;
	}

	restart(key: string): void {
		this.draft = newDraft(this.#record(), key);
	}
}
