import { describe, expect, it } from 'vitest';
import type { ReminderFate } from '$lib/domain/visits/views';
import { fateWords } from './fates';

const READER = { zone: 'Europe/Dublin', now: Date.parse('2026-03-03T09:00:00Z') };
const DUE = '2026-03-04T17:00:00Z';
const fate = (state: string, rest: Partial<ReminderFate> = {}): ReminderFate => ({
	dueAt: DUE,
	state,
	reason: null,
	sentAt: null,
	...rest
});
const words = (...reminders: ReminderFate[]) =>
	fateWords({ reminders, answer: null, noReminder: null }, READER);

describe('fateWords', () => {
	it.each<[ReminderFate, string, boolean]>([
		[fate('ready'), 'reminder goes tomorrow 17:00', false],
		[fate('sending'), 'reminder goes tomorrow 17:00', false],
		[fate('accepted', { sentAt: '2026-03-03T08:00:00Z' }), 'reminder sent 08:00', false],
		[fate('delivered', { sentAt: '2026-03-02T17:00:00Z' }), 'reminder delivered yesterday 17:00', false],
		[fate('undelivered', { reason: '30003' }), 'reminder not delivered: 30003', true],
		[fate('failed'), 'reminder not delivered: why is not known', true],
		[fate('skipped', { reason: 'no consent' }), 'no reminder sent: no consent to text messages', true],
		[fate('skipped', { reason: 'something new' }), 'no reminder sent: something new', true],
		[fate('held'), 'reminder held: no gateway is set up', true],
		[fate('cancelled'), 'reminder not needed any more', false]
	])('%j', (reminder, expected, alarming) => {
		expect(words(reminder)).toEqual([{ words: expected, alarming }]);
	});

	it.each([
		['too-late-for-one', 'no reminder will go: it was booked after the hour of the last one'],
		['no-consent', 'no reminder will go: no consent to text messages'],
		['no-number', 'no reminder will go: no telephone number is known'],
		['opted-out', 'no reminder will go: the patient asked for no more texts']
	] as const)('says why none will go: %s', (noReminder, expected) => {
		const reminders = noReminder === 'too-late-for-one' ? [] : [fate('ready')];
		expect(fateWords({ reminders, answer: null, noReminder }, READER)).toEqual([
			{ words: expected, alarming: true }
		]);
	});

	it('says that there is none', () => {
		expect(words()).toEqual([{ words: 'no reminder', alarming: false }]);
	});

	it.each([
		['ready', false],
		['accepted', false],
		['delivered', false],
		['cancelled', true],
		['failed', true]
	])('one that came too late alarms beside one that is %s: %s', (state, alarming) => {
		const late = fate('skipped', { reason: 'too late' });
		expect(words(late, fate(state))[0]?.alarming).toBe(alarming);
	});

	it('does not alarm once the patient has answered', () => {
		const answer = { at: '2026-03-03T08:30:00Z', yes: true };
		expect(fateWords({ reminders: [fate('failed')], answer, noReminder: null }, READER)[0]?.alarming).toBe(
			false
		);
	});

	it.each([
		[true, 'answered yes 08:30'],
		[false, 'answered no 08:30']
	])('ends with the answer, yes is %s', (yes, expected) => {
		const answer = { at: '2026-03-03T08:30:00Z', yes };
		const all = fateWords(
			{ reminders: [fate('delivered', { sentAt: DUE })], answer, noReminder: null },
			READER
		);
		expect(all.at(-1)).toEqual({ words: expected, alarming: false });
		expect(all).toHaveLength(2);
	});
});
