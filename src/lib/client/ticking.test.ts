// @vitest-environment jsdom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Ticking } from './ticking.svelte';

const SERVER_NOW = Date.UTC(2025, 11, 1, 14, 0);
let stop = () => {};

beforeEach(() => void vi.useFakeTimers({ now: SERVER_NOW - 86_400_000 }));
afterEach(() => {
	stop();
	vi.useRealTimers();
});

function ticking() {
	const clock = new Ticking(SERVER_NOW);
	stop = clock.start();
	return clock;
}

describe('the present instant', () => {
	it('is the server’s and ticks, whatever the device believes', () => {
		const clock = ticking();
		vi.advanceTimersByTime(3_000);
		expect(clock.now).toBe(SERVER_NOW + 3_000);
	});

	it('follows the server when its clock was moved', () => {
		const clock = ticking();
		clock.set(SERVER_NOW + 3_600_000);
		expect(clock.now).toBe(SERVER_NOW + 3_600_000);
		vi.advanceTimersByTime(2_000);
		expect(clock.now).toBe(SERVER_NOW + 3_602_000);
	});

	it('has caught up when a device that slept is looked at, though its steady clock stood still', () => {
		const clock = ticking();
		vi.setSystemTime(Date.now() + 1_800_000);
		document.dispatchEvent(new Event('visibilitychange'));
		expect(clock.now).toBe(SERVER_NOW + 1_800_000);
	});

	it('does not go back with the clock of the device', () => {
		const clock = ticking();
		vi.setSystemTime(Date.now() - 1_800_000);
		vi.advanceTimersByTime(1_000);
		expect(clock.now).toBe(SERVER_NOW + 1_000);
	});
});
