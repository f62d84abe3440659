import { vi } from 'vitest';

/** A browser's EventSource whose server is the test. */
export class FakeEventSource extends EventTarget {
	static readonly CLOSED = 2;
	static opened: FakeEventSource[] = [];
	static get newest(): FakeEventSource {
		const newest = FakeEventSource.opened.at(-1);
		if (!newest) {
			throw new Error('No stream was opened.');
		}
		return newest;
	}

	readyState = 1;
	onerror: (() => void) | null = null;

	constructor(readonly url: string) {
		super();
		FakeEventSource.opened.push(this);
	}

	send(kind: string, data: unknown, lastEventId = ''): void {
		const text = typeof data === 'string' ? data : JSON.stringify(data);
		if (this.readyState !== FakeEventSource.CLOSED) {
			this.dispatchEvent(new MessageEvent(kind, { data: text, lastEventId }));
		}
	}

	/** The connection breaks: the browser tries again by itself. */
	break(): void {
		this.readyState = 0;
		this.onerror?.();
	}

	/** The server refuses: the browser gives up. */
	refuse(): void {
		this.readyState = FakeEventSource.CLOSED;
		this.onerror?.();
	}

	close(): void {
		this.readyState = FakeEventSource.CLOSED;
	}
}

/** A channel between the tabs of one test, which delivers at once and to everybody else on a channel of that name. */
export class FakeChannel {
	static all = new Set<FakeChannel>();
	onmessage: ((event: { data: unknown }) => void) | null = null;

	constructor(readonly name: string) {
		FakeChannel.all.add(this);
	}

	postMessage(data: unknown): void {
		const others = [...FakeChannel.all].filter((other) => other !== this && other.name === this.name);
		others.forEach((other) => other.onmessage?.({ data }));
	}

	close(): void {
		FakeChannel.all.delete(this);
	}
}

/** The locks of one browser: who asks first for one holds it until they are done, then the next gets it. */
export function fakeLocks() {
	const tails = new Map<string, Promise<void>>();
	return {
		request(name: string, _options: object, hold: () => Promise<void>): Promise<void> {
			const tail = (tails.get(name) ?? Promise.resolve()).then(hold);
			tails.set(name, tail);
			return tail;
		}
	};
}

/** Put the fakes where the browser's own would be, and start with none opened. */
export function fakeBrowser(): void {
	FakeEventSource.opened = [];
	FakeChannel.all.clear();
	vi.stubGlobal('EventSource', FakeEventSource);
	vi.stubGlobal('BroadcastChannel', FakeChannel);
	Object.defineProperty(navigator, 'locks', { value: fakeLocks(), configurable: true });
}
