import fc from 'fast-check';
import type { Channel, Outgoing, Sent } from '$lib/server/outbox/channels/channel';
import { accepted, transient, unknown } from './channels';

/** What happens to the visit of a story, and so many hours after the deed before it. */
export const DEEDS = [
	'move',
	'length',
	'confirm',
	'yes',
	'cancel',
	'attend',
	'miss',
	'reopen',
	'zone',
	'stop',
	'start'
] as const;
export interface Deed {
	kind: (typeof DEEDS)[number];
	hoursLater: number;
	/** Where the visit moves: so many days from where it is, at that time. How else it changes follows from them too. */
	days: number;
	time: string;
}

/** How one attempt ends: `taken` lies on the telephone though no answer came, `lost` does not. */
export const FATES = ['accepted', 'transient', 'taken', 'lost'] as const;
type Fate = (typeof FATES)[number];

export interface Story {
	day: number;
	lead: number;
	time: string;
	series: boolean;
	lateMinutes: number;
	deeds: Deed[];
	fates: Fate[];
	/** Whether each look-up in turn gets an answer. */
	answers: boolean[];
}

const CLOCKS = ['00:30', '01:30', '02:30', '07:30', '09:00', '10:00', '14:15', '18:45', '23:30'];
const time = fc.constantFrom(...CLOCKS);

export const stories: fc.Arbitrary<Story> = fc.record({
	day: fc.integer({ min: 0, max: 364 }),
	lead: fc.integer({ min: 0, max: 120 }),
	time,
	series: fc.boolean(),
	lateMinutes: fc.constantFrom(0, 0, 1, 30, 300),
	deeds: fc.array(
		fc.record({
			kind: fc.constantFrom<Deed['kind']>('move', 'move', ...DEEDS, 'reopen', 'start'),
			hoursLater: fc.integer({ min: 0, max: 60 }),
			days: fc.integer({ min: -2, max: 6 }),
			time
		}),
		{ maxLength: 6 }
	),
	fates: fc.array(fc.constantFrom<Fate>('accepted', ...FATES), { maxLength: 12 }),
	answers: fc.array(fc.boolean(), { maxLength: 6 })
});

/** A text that lies on the telephone, with what was true at that moment. */
export interface Taken<Truth> {
	id: string;
	at: number;
	message: Outgoing;
	truth: Truth;
}

/** The gateway and the telephone behind it: it knows what it took, and cannot always be asked. */
export class Telephone<Truth> implements Channel {
	readonly taken: Taken<Truth>[] = [];
	/** How often each end of an attempt was met, to see that the stories have them all. */
	readonly met = { accepted: 0, transient: 0, taken: 0, lost: 0 };
	now = 0;
	readonly #fates: Fate[];
	readonly #answers: boolean[];
	readonly #truth: () => Promise<Truth>;

	constructor({ fates, answers }: Pick<Story, 'fates' | 'answers'>, truth: () => Promise<Truth>) {
		this.#fates = [...fates];
		this.#answers = [...answers];
		this.#truth = truth;
	}

	async send(message: Outgoing): Promise<Sent> {
		const fate = this.#fates.shift() ?? 'accepted';
		this.met[fate] += 1;
		const id = `${message.id}-${this.taken.length}`;
		if (fate === 'accepted' || fate === 'taken') {
			this.taken.push({ id, at: this.now, message, truth: await this.#truth() });
		}
		switch (fate) {
			case 'accepted':
				return accepted(id);
			case 'transient':
				return transient();
			case 'taken':
			case 'lost':
				return unknown();
		}
	}

	lookUp = ({ to, body }: Outgoing): Promise<string[] | null> => {
		const found = this.taken.filter(({ message }) => message.to === to && message.body === body);
		return Promise.resolve((this.#answers.shift() ?? true) ? found.map(({ id }) => id).reverse() : null);
	};
}
