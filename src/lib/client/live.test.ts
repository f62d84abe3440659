// @vitest-environment jsdom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { BEAT_MS, SILENCE_MS } from '$lib/domain/live/beat';
import { LiveConnection } from './live.svelte';
import { fakeBrowser, FakeEventSource } from './testing';

const NOW = Date.UTC(2025, 11, 1, 14, 0);
/** The device is a minute slow. */
const SERVER_NOW = NOW + 60_000;
const CHANGE = { topic: 'thread', kind: 'entry', id: 't1', episodeId: 'e1' };

const stops: (() => void)[] = [];

beforeEach(() => {
	vi.useFakeTimers({ now: NOW });
	fakeBrowser();
});
afterEach(() => {
	stops.splice(0).forEach((stop) => stop());
	vi.useRealTimers();
	vi.unstubAllGlobals();
	vi.restoreAllMocks();
});

/** A tab of the browser; the first one gets the stream. */
async function tab(cursor = 7, userId = 'una') {
	const listener = { heard: vi.fn(), lostTrack: vi.fn(), told: vi.fn() };
	const live = new LiveConnection({ userId, cursor }, listener);
	const stop = live.start();
	stops.push(stop);
	await settled();
	return { live, listener, stop };
}

/** Everything that waits for a promise has had its turn; no time has passed. */
const settled = () => vi.advanceTimersByTimeAsync(0);
const beat = (serverNow = SERVER_NOW) => FakeEventSource.newest.send('beat', String(serverNow));
const answer = (status: number, body: unknown = {}) =>
	vi.stubGlobal(
		'fetch',
		vi.fn(() => Promise.resolve(new Response(JSON.stringify(body), { status })))
	);

describe('a tab is connected', () => {
	it('by a beat, and not by a stream that is merely open', async () => {
		const { live } = await tab();
		FakeEventSource.newest.dispatchEvent(new Event('open'));
		expect(live.connected).toBe(false);
		beat();
		expect(live.connected).toBe(true);
		expect(live.since).toBeNull();
	});

	it.each([
		['change', CHANGE],
		['reset', {}]
	])('by an event (%s)', async (kind, data) => {
		const { live } = await tab();
		FakeEventSource.newest.send(kind, data, '8');
		expect(live.connected).toBe(true);
	});

	it('never because the server answers something else', async () => {
		answer(200);
		const { live } = await tab();
		FakeEventSource.newest.break();
		await vi.advanceTimersByTimeAsync(10 * SILENCE_MS);
		expect(live.connected).toBe(false);
	});

	it.each([
		['just under', -1_000, true],
		['at', 0, true],
		['over', 1_000, false]
	])('while the silence is %s two intervals', async (_, more, connected) => {
		const { live } = await tab();
		beat();
		await vi.advanceTimersByTimeAsync(SILENCE_MS + more);
		expect(live.connected).toBe(connected);
		expect(FakeEventSource.opened).toHaveLength(connected ? 1 : 2);
	});

	it('as long as beats come', async () => {
		const { live } = await tab();
		for (let n = 0; n < 10; n += 1) {
			beat(SERVER_NOW + n * BEAT_MS);
			await vi.advanceTimersByTimeAsync(BEAT_MS);
			expect(live.connected).toBe(true);
		}
		expect(FakeEventSource.opened).toHaveLength(1);
	});
});

describe('a stream that went silent', () => {
	it('is closed, opened anew from the last event, and lost since the last sign, by the server’s clock', async () => {
		const { live } = await tab(7);
		beat();
		FakeEventSource.newest.send('change', CHANGE, '9');
		const dead = FakeEventSource.newest;
		await vi.advanceTimersByTimeAsync(SILENCE_MS + 1_000);
		expect(dead.readyState).toBe(FakeEventSource.CLOSED);
		expect(FakeEventSource.newest.url).toBe('/api/live?beats=1&as=una&after=9');
		expect(live.since).toBe(SERVER_NOW);
		beat();
		expect(live.connected).toBe(true);
	});

	it('is noticed at once by a page that wakes from sleep', async () => {
		const { live } = await tab();
		beat();
		vi.setSystemTime(NOW + 3_600_000);
		document.dispatchEvent(new Event('visibilitychange'));
		expect(live.connected).toBe(false);
		expect(FakeEventSource.opened).toHaveLength(2);
	});

	it('is tried again for as long as nothing comes', async () => {
		await tab();
		await vi.advanceTimersByTimeAsync(3 * (SILENCE_MS + 1_000));
		expect(FakeEventSource.opened).toHaveLength(4);
	});
});

describe('a device without a network', () => {
	it('says so at once, and is connected again only by a beat', async () => {
		const { live } = await tab();
		beat();
		await vi.advanceTimersByTimeAsync(5_000);
		dispatchEvent(new Event('offline'));
		expect(live).toMatchObject({ connected: false, offline: true, since: SERVER_NOW + 5_000 });
		dispatchEvent(new Event('online'));
		expect(live).toMatchObject({ connected: false, offline: false });
		beat();
		expect(live.connected).toBe(true);
	});

	it('at the start knows it from the browser', async () => {
		vi.spyOn(navigator, 'onLine', 'get').mockReturnValue(false);
		const { live } = await tab();
		expect(live).toMatchObject({ connected: false, offline: true, since: null });
	});
});

describe('a refusal', () => {
	it('of a sign-in that ended is told, and not tried again by itself', async () => {
		answer(401);
		const { live } = await tab();
		beat();
		FakeEventSource.newest.refuse();
		await settled();
		expect(live).toMatchObject({ connected: false, signedOut: true });
		await vi.advanceTimersByTimeAsync(10 * SILENCE_MS);
		expect(FakeEventSource.opened).toHaveLength(1);
	});

	it('because somebody else signed in is told like an end, and not tried again by itself', async () => {
		answer(200, { user: { id: 'bela' } });
		const { live } = await tab();
		beat();
		FakeEventSource.newest.refuse();
		await settled();
		expect(live).toMatchObject({ connected: false, signedOut: true });
		await vi.advanceTimersByTimeAsync(10 * SILENCE_MS);
		expect(FakeEventSource.opened).toHaveLength(1);
	});

	it.each([
		['of a server that stops', 503, {}],
		['of somebody who is still signed in', 200, { user: { id: 'una' } }]
	])('%s is tried again', async (_, status, body) => {
		answer(status, body);
		await tab();
		FakeEventSource.newest.refuse();
		await vi.advanceTimersByTimeAsync(2_000);
		expect(FakeEventSource.opened).toHaveLength(2);
	});

	it('is tried again when a tab was opened where somebody signed in', async () => {
		answer(401);
		const { live } = await tab();
		FakeEventSource.newest.refuse();
		await settled();
		await tab();
		expect(FakeEventSource.opened).toHaveLength(2);
		beat();
		expect(live.signedOut).toBe(false);
	});
});

describe('several tabs', () => {
	it('share one stream, its events, its time and its end', async () => {
		const first = await tab();
		beat();
		const second = await tab();
		expect(FakeEventSource.opened).toHaveLength(1);
		expect(second.live.connected).toBe(true);
		FakeEventSource.newest.send('change', CHANGE, '8');
		expect(second.listener.heard).toHaveBeenCalledExactlyOnceWith(CHANGE);
		beat(SERVER_NOW + 1_000);
		expect(second.listener.told).toHaveBeenLastCalledWith(SERVER_NOW + 1_000);
		FakeEventSource.newest.break();
		expect([first.live.connected, second.live.connected]).toEqual([false, false]);
	});

	it('hand the stream on, from the last event', async () => {
		const first = await tab(7);
		const second = await tab(7);
		FakeEventSource.newest.send('change', CHANGE, '12');
		first.stop();
		await settled();
		expect(FakeEventSource.newest.url).toBe('/api/live?beats=1&as=una&after=12');
		beat();
		expect(second.live.connected).toBe(true);
	});

	it('of somebody else lead none of mine, and neither hear the other', async () => {
		const before = await tab(7, 'una');
		beat();
		const [hers] = FakeEventSource.opened;
		const after = await tab(7, 'bela');
		expect(FakeEventSource.newest.url).toBe('/api/live?beats=1&as=bela&after=7');
		expect(after.live.connected).toBe(false);
		beat();
		hers?.send('change', CHANGE, '8');
		expect(before.listener.heard).toHaveBeenCalledExactlyOnceWith(CHANGE);
		expect(after.listener.heard).not.toHaveBeenCalled();
		hers?.break();
		expect([before.live.connected, after.live.connected]).toEqual([false, true]);
	});

	it('do not believe a tab that fell silent', async () => {
		const first = await tab();
		beat();
		const second = await tab();
		first.stop();
		await vi.advanceTimersByTimeAsync(SILENCE_MS + 2_000);
		expect(second.live.connected).toBe(false);
	});
});
