import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { TOAST_MS, Toasts } from './toasts.svelte';

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

const texts = (toasts: Toasts) => toasts.items.map(({ text }) => text);

describe('Toasts', () => {
	it.each([
		[TOAST_MS - 1, ['Kept.']],
		[TOAST_MS, []]
	])('after %d ms shows %s', (ms, shown) => {
		const toasts = new Toasts();
		toasts.show('Kept.');
		vi.advanceTimersByTime(ms);
		expect(texts(toasts)).toEqual(shown);
	});

	it('keeps an old one for its own time when a new one comes', () => {
		const toasts = new Toasts();
		toasts.show('First.');
		vi.advanceTimersByTime(TOAST_MS / 2);
		toasts.show('Second.');
		expect(texts(toasts)).toEqual(['First.', 'Second.']);
		vi.advanceTimersByTime(TOAST_MS / 2);
		expect(texts(toasts)).toEqual(['Second.']);
	});

	it('takes a way back once and is gone', () => {
		const toasts = new Toasts();
		const run = vi.fn();
		toasts.show('Taken.', { undo: { label: 'Undo', run }, ms: 5_000 });
		const [toast] = toasts.items;
		expect(toast).toBeDefined();
		if (toast) {
			toasts.undo(toast);
		}
		vi.advanceTimersByTime(60_000);
		expect(run).toHaveBeenCalledTimes(1);
		expect(toasts.items).toEqual([]);
	});

	it('waits while somebody reads', () => {
		const toasts = new Toasts();
		toasts.show('Kept.');
		toasts.hold();
		vi.advanceTimersByTime(TOAST_MS * 10);
		expect(texts(toasts)).toEqual(['Kept.']);
		toasts.release();
		vi.advanceTimersByTime(TOAST_MS);
		expect(texts(toasts)).toEqual([]);
	});

	it('keeps what comes while somebody reads, and gives each its own time afterwards', () => {
		const toasts = new Toasts();
		toasts.hold();
		toasts.show('Kept.');
		toasts.show('Taken.', { ms: TOAST_MS * 2 });
		vi.advanceTimersByTime(TOAST_MS * 10);
		expect(texts(toasts)).toEqual(['Kept.', 'Taken.']);
		toasts.release();
		vi.advanceTimersByTime(TOAST_MS * 2 - 1);
		expect(texts(toasts)).toEqual(['Taken.']);
		vi.advanceTimersByTime(1);
		expect(texts(toasts)).toEqual([]);
	});
});
