import type { Channel, Outgoing, Sent } from '$lib/server/outbox/channels/channel';

export const accepted = (id: string): Sent => ({ outcome: { kind: 'accepted', id }, code: null });
export const permanent = (reason: 'opted-out' | 'bad-address' | 'refused', code = '400'): Sent => ({
	outcome: { kind: 'permanent', reason },
	code
});
export const transient = (retryAfter: number | null = null): Sent => ({
	outcome: { kind: 'transient', reason: 'gateway-down', retryAfter },
	code: '500'
});
export const unknown = (): Sent => ({
	outcome: { kind: 'unknown', reason: 'no-answer' },
	code: 'ECONNRESET'
});

/**
 * A channel that does what it is told, in order, and afterwards accepts everything. `held` keeps every call waiting
 * until it is released, to look at what is on its way.
 */
export class ScriptedChannel implements Channel {
	readonly sent: Outgoing[] = [];
	readonly asked: Outgoing[] = [];
	/** How the next attempts end. */
	script: Sent[] = [];
	/** What the next look-ups find; null for no answer. Nothing is found where it is empty. */
	found: (string[] | null)[] = [];
	#release: (() => void)[] = [];
	#hold = false;
	inFlight = 0;
	mostInFlight = 0;

	async send(message: Outgoing): Promise<Sent> {
		this.sent.push(message);
		this.inFlight += 1;
		this.mostInFlight = Math.max(this.mostInFlight, this.inFlight);
		if (this.#hold) {
			await new Promise<void>((resolve) => this.#release.push(resolve));
		}
		this.inFlight -= 1;
		return this.script.shift() ?? accepted(`id-${this.sent.length}`);
	}

	lookUp: Channel['lookUp'] = (message) => {
		this.asked.push(message);
		return Promise.resolve(this.found.length > 0 ? (this.found.shift() ?? null) : []);
	};

	hold(): void {
		this.#hold = true;
	}

	release(): void {
		this.#hold = false;
		this.#release.splice(0).forEach((resolve) => resolve());
	}
}
