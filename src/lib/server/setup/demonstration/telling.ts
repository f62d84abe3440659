import type { Reading, SessionBody } from '$lib/domain/bedside/forms';
import type { BookVisits } from '$lib/domain/visits/forms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { toRfc3339 } from '$lib/domain/core/instant';
import { MINUTE, type Instant } from '$lib/domain/core/time';
import type { MoveInput } from '$lib/domain/episodes/forms';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { planReminders } from '$lib/domain/visits/reminders';
import { planSeries } from '$lib/domain/visits/series';
import { recordSession } from '../../bedside/actions';
import { askClearance, giveClearance, holdClearance, withholdClearance } from '../../clearances/actions';
import type { PersonContext } from '../../context';
import { admitPatient } from '../../episodes/actions';
import { movePatient } from '../../episodes/move';
import { arriveAtEscalation } from '../../escalations/arrive';
import { settleEscalation } from '../../escalations/end';
import { raiseEscalation } from '../../escalations/raise';
import { takeEscalation } from '../../escalations/take';
import { acceptReferral, closeReferral, declineReferral, refer } from '../../referrals/actions';
import { postEntry } from '../../threads/actions';
import { receiveText } from '../../messages/receive-text';
import { attendVisit, bookVisits, confirmVisit, missVisit } from '../../visits/actions';
import type { Calendar } from './calendar';
import type { Found } from './found';
import { Later } from './later';
import type { DemoPatient } from './patients';
import type { PersonKey } from './people';
import { decideOnTheRound } from './round';

/** One deed at one instant. The deeds of all stories are done in the order of time. */
export interface Deed {
	at: Instant;
	run(): Promise<void>;
}

type Input<F extends (context: PersonContext, id: string, input: never) => unknown> = Parameters<F>[2];

/** A bedside treatment as a story writes it; the rest follows from the patient. */
export interface ToldSession extends Partial<
	Omit<SessionBody, 'context' | 'startedAt' | 'endedAt' | 'level' | 'before' | 'after'>
> {
	level: number;
	minutes: number;
	before: Reading;
	after: Reading;
	about?: Partial<SessionBody['context']>;
}

/** A visit as a story knows it; `remindedAt` is when its first text is due. */
export interface ToldVisit {
	visit: Later;
	startsAt: Instant;
	remindedAt: Instant | null;
}

/**
 * Tells the story of one patient through the actions that people use. Every verb names when and who, and what it
 * makes is known to the verbs after it as a {@link Later}.
 */
export class Telling {
	readonly deeds: Deed[] = [];
	readonly #episode = new Later('the episode');

	constructor(
		readonly patient: DemoPatient,
		readonly when: Calendar,
		private readonly found: Found
	) {}

	admit(at: Instant, who: PersonKey, place: { unit: string; bed: string }, operatedAt: Instant): void {
		const { name, birthDate, sex, mrn, phone, smsConsent, procedure, approach, surgeon } = this.patient;
		this.#do(at, who, async (as) => {
			const { result } = await admitPatient(as, {
				patient: { name, birthDate, sex, mrn, phone, smsConsent, language: 'en' },
				operation: { procedure, approach, operatedAt: toRfc3339(operatedAt) },
				surgeonId: this.found.people[surgeon].id,
				...place,
				level: 1,
				betaBlocked: this.patient.betaBlocked,
				rhythm: 'sinus'
			});
			this.#episode.is(result.id);
		});
	}

	move(at: Instant, who: PersonKey, place: MoveInput): void {
		this.#do(at, who, (as) => movePatient(as, this.#episode.id, place));
	}

	/** @returns the referral; its thread is what `say` speaks in */
	refer(at: Instant, who: PersonKey, input: Input<typeof refer>): { referral: Later; thread: Later } {
		const made = { referral: new Later('a referral'), thread: new Later('a thread') };
		this.#do(at, who, async (as) => {
			const { result } = await refer(as, this.#episode.id, input);
			made.referral.is(result.id);
			made.thread.is(result.threadId);
		});
		return made;
	}

	accept(at: Instant, who: PersonKey, { referral }: { referral: Later }): void {
		this.#do(at, who, (as) => acceptReferral(as, referral.id));
	}

	decline(at: Instant, who: PersonKey, { referral }: { referral: Later }, reason: string): void {
		this.#do(at, who, (as) => declineReferral(as, referral.id, reason));
	}

	close(at: Instant, who: PersonKey, { referral }: { referral: Later }, reason: string): void {
		this.#do(at, who, (as) => closeReferral(as, referral.id, reason));
	}

	say(at: Instant, who: PersonKey, { thread }: { thread: Later }, body: string): void {
		this.#do(at, who, (as) => postEntry(as, thread.id, { body }));
	}

	ask(at: Instant, who: PersonKey, kind: ClearanceKind, question: string): Later {
		const made = new Later(`the ask for ${kind}`);
		this.#do(at, who, async (as) => {
			made.is((await askClearance(as, this.#episode.id, { kind, question })).result.id);
		});
		return made;
	}

	give(at: Instant, who: PersonKey, clearance: Later, input: Input<typeof giveClearance>): void {
		this.#do(at, who, (as) => giveClearance(as, clearance.id, input));
	}

	withhold(at: Instant, who: PersonKey, clearance: Later, reason: string): void {
		this.#do(at, who, (as) => withholdClearance(as, clearance.id, reason));
	}

	hold(at: Instant, who: PersonKey, clearance: Later, reason: string): void {
		this.#do(at, who, (as) => holdClearance(as, clearance.id, reason));
	}

	/** Any other deed about the stay. */
	deed(at: Instant, who: PersonKey, run: (as: PersonContext, id: string) => Promise<unknown>): void {
		this.#do(at, who, (as) => run(as, this.#episode.id));
	}

	/** @param at when it is recorded, two minutes after its end */
	session(at: Instant, who: PersonKey, told: ToldSession): Later {
		const made = new Later('a session');
		const endedAt = at - 2 * MINUTE;
		const round = endedAt - told.minutes * MINUTE - 30 * MINUTE;
		this.#do(round, 'physician', (as) => decideOnTheRound(as, this.#episode.id, told.level));
		this.#do(at, who, async (as) => {
			const body = this.#sessionBody(endedAt - told.minutes * MINUTE, endedAt, told);
			made.is((await recordSession(as, this.#episode.id, body)).result.id);
		});
		return made;
	}

	raise(at: Instant, who: PersonKey, input: Omit<RaiseInput, 'sessionId'>, session?: Later): Later {
		const made = new Later('an escalation');
		this.#do(at, who, async (as) => {
			const full = session ? { ...input, sessionId: session.id } : input;
			made.is((await raiseEscalation(as, this.#episode.id, full)).result.id);
		});
		return made;
	}

	take(at: Instant, who: PersonKey, escalation: Later, etaMinutes: number | null): void {
		this.#do(at, who, (as) => takeEscalation(as, escalation.id, etaMinutes));
	}

	arrive(at: Instant, who: PersonKey, escalation: Later): void {
		this.#do(at, who, (as) => arriveAtEscalation(as, escalation.id));
	}

	settle(at: Instant, who: PersonKey, escalation: Later, input: Input<typeof settleEscalation>): void {
		this.#do(at, who, (as) => settleEscalation(as, escalation.id, input));
	}

	/** @returns the visits in the order of their days */
	book(at: Instant, who: PersonKey, input: BookVisits): ToldVisit[] {
		const inSeries = input.kind === 'series';
		const { zone } = this.when;
		const starts = inSeries ? planSeries(input, zone).map(({ startsAt }) => startsAt) : [input.startsAt];
		const visits = starts.map((startsAt) => {
			const [reminder] = planReminders({ startsAt, inSeries }, { zone, patientZone: zone, now: at });
			return { visit: new Later('a visit'), startsAt, remindedAt: reminder?.dueAt ?? null };
		});
		this.#do(at, who, async (as) => {
			const { items } = (await bookVisits(as, this.#episode.id, input)).result;
			visits.forEach(({ visit }, index) => visit.is(items[index]?.id ?? ''));
		});
		return visits;
	}

	confirm(at: Instant, who: PersonKey, { visit }: ToldVisit): void {
		this.#do(at, who, (as) => confirmVisit(as, visit.id));
	}

	attend(at: Instant, who: PersonKey, { visit }: ToldVisit): void {
		this.#do(at, who, (as) => attendVisit(as, visit.id));
	}

	miss(at: Instant, who: PersonKey, { visit }: ToldVisit, reason: string): void {
		this.#do(at, who, (as) => missVisit(as, visit.id, reason));
	}

	/** The patient answers the newest reminder by text. */
	reply(at: Instant, body: string): void {
		const { phone = '', mrn } = this.patient;
		const sid = `demonstration-${mrn}-${at}`;
		const form = new Map([
			['From', phone],
			['Body', body],
			['MessageSid', sid]
		]);
		this.deeds.push({
			at,
			run: () => receiveText(form, { actor: null, now: at, address: null, key: null })
		});
	}

	#do(at: Instant, who: PersonKey, work: (as: PersonContext) => Promise<unknown>): void {
		const as = { actor: this.found.people[who], now: at, address: null, key: null };
		this.deeds.push({ at, run: async () => void (await work(as)) });
	}

	#sessionBody(startedAt: Instant, endedAt: Instant, told: ToldSession): SessionBody {
		const { level, before, after, about, minutes: _, ...rest } = told;
		const { betaBlocked, approach } = this.patient;
		return {
			context: {
				betaBlocked,
				rhythm: 'sinus',
				sternotomy: approach === 'sternotomy',
				level: level as SessionBody['level'],
				conscious: true,
				followsCommands: true,
				airway: 'none',
				...about
			},
			startedAt: toRfc3339(startedAt),
			endedAt: toRfc3339(endedAt),
			level: level as SessionBody['level'],
			before,
			after,
			during: [],
			symptoms: [],
			activities: [],
			...rest
		};
	}
}
