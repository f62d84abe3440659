import { describe, expect, it } from 'vitest';
import { historyOf } from './history';

const at = (second: number) => `2026-03-03T09:00:${String(second).padStart(2, '0')}Z`;

const STEP = {
	step: 0,
	post: 'nurse',
	name: 'Rose Ferris',
	channel: 'sms',
	at: at(0),
	message: 'delivered'
} as const;

describe('historyOf', () => {
	it('orders by time, and puts the call before the messages it caused', () => {
		const moves = [
			{ at: at(0), by: 'Iris Aldous', kind: 'raised' },
			{ at: at(9), by: 'Rose Ferris', kind: 'taken' }
		];
		const lines = historyOf({ moves, steps: [STEP, { ...STEP, at: at(5), message: 'accepted' }] });
		expect(lines.map(({ words, fate }) => [words, fate])).toEqual([
			['Iris Aldous raised it.', null],
			['Told: Rose Ferris, nurse on cover', 'Text message delivered.'],
			['Told: Rose Ferris, nurse on cover', 'Text message sent, no word yet whether it arrived.'],
			['Rose Ferris took it.', null]
		]);
	});

	it('shows a post that nobody covered', () => {
		const [line] = historyOf({ moves: [], steps: [{ ...STEP, name: null, channel: null, message: null }] });
		expect(line).toMatchObject({ words: 'Nobody was on cover as nurse on cover.', failed: true });
	});

	it.each([
		['ready', false],
		['accepted', false],
		['cancelled', false],
		['undelivered', true],
		['failed', true],
		['held', true],
		['skipped', true]
	])('a message that is %s: did not reach its reader is %s', (message, failed) => {
		const [line] = historyOf({ moves: [], steps: [{ ...STEP, message }] });
		expect(line?.failed).toBe(failed);
	});

	it('does not lose a kind of move that it has no words for', () => {
		const [line] = historyOf({ moves: [{ at: at(0), by: null, kind: 'asked' }], steps: [] });
		expect(line?.words).toBe('The hospital’s clockwork: asked');
	});
});
