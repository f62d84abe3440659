import { describe, expect, it } from 'vitest';
import type { EscalationView } from '$lib/domain/escalations/views';
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

type Move = EscalationView['moves'][number];
const move = (given: Partial<Move>): Move => ({
	at: at(0),
	by: null,
	kind: 'raised',
	other: null,
	etaMinutes: null,
	...given
});

describe('historyOf', () => {
	it('orders by time, and puts the call before the messages it caused', () => {
		const moves = [
			move({ kind: 'raised', by: 'Iris Aldous' }),
			move({ at: at(9), kind: 'taken', by: 'Rose Ferris' })
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

	it('tells a telephone that rang from a text', () => {
		const steps = [STEP, { ...STEP, channel: 'voice' as const, at: at(5) }];
		expect(historyOf({ moves: [], steps }).map(({ fate }) => fate)).toEqual([
			'Text message delivered.',
			'The telephone was answered.'
		]);
	});

	it.each<[Partial<Move>, string]>([
		[{ kind: 'passed', by: 'Rose Ferris', other: 'Odran Keel' }, 'Rose Ferris passes it on to Odran Keel.'],
		[
			{ kind: 'confirmed', by: 'Odran Keel', other: 'Rose Ferris' },
			'Odran Keel has it now, from Rose Ferris.'
		],
		[{ kind: 'asked', other: 'Rose Ferris' }, 'Rose Ferris was asked: at the bedside?'],
		[{ kind: 'eta', by: 'Rose Ferris', etaMinutes: 4 }, 'Rose Ferris will be there in 4 min.'],
		[
			{ kind: 'told-in-person', by: 'Iris Aldous', other: 'Rose Ferris' },
			'Iris Aldous told Rose Ferris in person.'
		]
	])('names both sides of %o', (given, words) => {
		const [line] = historyOf({ moves: [move(given)], steps: [] });
		expect(line?.words).toBe(words);
	});
});
