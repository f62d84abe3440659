import { and, asc, eq, inArray } from 'drizzle-orm';
import { WEEKDAYS, addDays, instantOf, localDateOf } from '$lib/domain/core/time';
import type { BookVisits } from '$lib/domain/visits/forms';
import { Problem } from '$lib/domain/core/errors';
import { db } from '$lib/server/db';
import { outbox, patients, reminders, visits } from '$lib/server/db/schema';
import { amendContact } from '$lib/server/episodes/patient';
import { receiveText } from '$lib/server/messages/receive-text';
import { OutboxWorker } from '$lib/server/outbox/worker';
import {
	attendVisit,
	bookVisits,
	cancelVisit,
	confirmVisit,
	missVisit,
	reopenVisit
} from '$lib/server/visits/actions';
import { rescheduleVisit } from '$lib/server/visits/reschedule';
import { contextOf, type Hospital } from './hospital';
import { DAY_MS, HOUR_MS } from './lengths';
import { Telephone, type Deed, type Story } from './reminder-year';

/** The hospital's zone, in which visits are agreed. */
export const HOME = 'Europe/Dublin';
/** Where the patients live, and move to. */
export const ZONES = ['Europe/Berlin', 'America/New_York', 'Australia/Lord_Howe', 'Europe/Dublin'];
const WHERE = { minutes: 45, place: 'East Gym' };
const FIRST = '2026-01-03';

type VisitRow = typeof visits.$inferSelect;

/** What is so at one moment, read from the tables. */
export interface Truth {
	visits: VisitRow[];
	optedOut: boolean;
	/** Where the patient lives. */
	zone: string;
	/** The reminders, each with the sequence that it then told of. */
	reminders: (typeof reminders.$inferSelect)[];
}

let texts = 0;

/** One story, lived by a patient of its own: deeds by the real actions, texts by what the gateway's calls lead to. */
export class Course {
	#now = 0;
	readonly telephone: Telephone<Truth>;
	readonly done = new Set<Deed['kind']>();

	constructor(
		readonly hospital: Hospital,
		readonly story: Story,
		readonly patient: { id: string; phone: string },
		readonly episodeId: string
	) {
		this.telephone = new Telephone(story, () => this.#truth());
	}

	async run(): Promise<void> {
		const { day, time, lead, series, deeds } = this.story;
		const date = addDays(FIRST, day);
		const startsAt = instantOf(date, time, HOME);
		this.#now = startsAt - lead * HOUR_MS;
		const input: BookVisits = series
			? { kind: 'series', from: date, weekdays: [...WEEKDAYS], time, count: 2, ...WHERE }
			: { kind: 'single', startsAt, ...WHERE };
		await unlessRefused(bookVisits(this.#staff(), this.episodeId, input));
		const [visit] = await this.#visits();
		for (const deed of visit ? deeds : []) {
			await this.#pass(this.#now + deed.hoursLater * HOUR_MS);
			const [row] = await db()
				.select()
				.from(visits)
				.where(eq(visits.id, visit?.id ?? ''));
			await unlessRefused(row ? this.#do(deed, row).then(() => this.done.add(deed.kind)) : Promise.resolve());
		}
		await this.#pass(this.#now + 60 * DAY_MS);
	}

	#do({ kind, days, time }: Deed, { id, startsAt, minutes }: VisitRow): Promise<unknown> {
		switch (kind) {
			case 'move': {
				const to = addDays(localDateOf(startsAt, HOME), days);
				return rescheduleVisit(this.#staff(), id, { startsAt: instantOf(to, time, HOME) });
			}
			case 'confirm':
				return confirmVisit(this.#staff(), id);
			case 'cancel':
				return cancelVisit(this.#staff(), id, 'Away.');
			case 'attend':
				return attendVisit(this.#staff(), id, 'At the desk.');
			case 'miss':
				return missVisit(this.#staff(), id, 'Did not come.');
			case 'reopen':
				return reopenVisit(this.#staff(), id, 'The wrong row.');
			case 'length':
				return rescheduleVisit(this.#staff(), id, {
					startsAt,
					minutes: minutes === 45 ? 60 : 45
				});
			case 'zone':
				return amendContact(this.#staff(), this.episodeId, { zone: ZONES[(days + 2) % ZONES.length] });
			case 'yes':
			case 'stop':
			case 'start':
				return this.#text(kind.toUpperCase());
		}
	}

	#text(body: string): Promise<void> {
		const form = new Map([
			['From', this.patient.phone],
			['MessageSid', `SM${(texts += 1)}`],
			['Body', body]
		]);
		return receiveText(form, { actor: null, now: this.#now, address: null, key: null });
	}

	/** Let time pass from one due message to the next; the worker comes a little late, as machines do. */
	async #pass(until: number): Promise<void> {
		const { telephone, story } = this;
		const channels = { sms: telephone, mail: null };
		const worker = new OutboxWorker({ channels, now: () => telephone.now, random: () => 0.5 });
		for (;;) {
			const due = and(eq(outbox.patientId, this.patient.id), eq(outbox.state, 'ready'));
			const [next] = await db().select().from(outbox).where(due).orderBy(asc(outbox.nextAt)).limit(1);
			telephone.now = Math.max(this.#now, next?.nextAt ?? until) + story.lateMinutes * 60_000;
			if (!next || telephone.now > until) {
				break;
			}
			await worker.settle();
		}
		this.#now = until;
	}

	async #truth(): Promise<Truth> {
		const [patient] = await db().select().from(patients).where(eq(patients.id, this.patient.id));
		const own = await this.#visits();
		const ids = own.map(({ id }) => id);
		return {
			visits: own,
			optedOut: patient?.smsOptedOutAt !== null,
			zone: patient?.zone ?? HOME,
			reminders: await db().select().from(reminders).where(inArray(reminders.visitId, ids))
		};
	}

	#visits = () =>
		db().select().from(visits).where(eq(visits.episodeId, this.episodeId)).orderBy(asc(visits.startsAt));
	#staff = () => contextOf(this.hospital.people.coordinator, this.#now);
}

async function unlessRefused(work: Promise<unknown>): Promise<void> {
	try {
		await work;
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
	}
}
