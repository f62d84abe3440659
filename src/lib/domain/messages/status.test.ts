import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SMS_STATUSES, hasFailed, laterStatus, readStatus } from './status';

describe('laterStatus', () => {
	it.each([
		[null, 'sent', 'sent'],
		['queued', 'sent', 'sent'],
		['delivered', 'sent', 'delivered'],
		['sent', 'sent', 'sent'],
		['sent', 'undelivered', 'undelivered'],
		['failed', 'queued', 'failed'],
		['failed', 'undelivered', 'failed'],
		['undelivered', 'delivered', 'delivered'],
		['delivered', 'failed', 'delivered']
	] as const)('%s, then %s: %s', (known, told, expected) => {
		expect(laterStatus(known, told)).toBe(expected);
	});

	it('property: any order of the same callbacks of a delivered message ends the same', () => {
		const callbacks = ['queued', 'sending', 'sent', 'delivered', 'sent', 'delivered'] as const;
		fc.assert(
			fc.property(fc.shuffledSubarray([...callbacks], { minLength: callbacks.length }), (shuffled) => {
				expect(shuffled.reduce(laterStatus, null as null | 'queued')).toBe('delivered');
			})
		);
	});
});

describe('readStatus', () => {
	it.each(SMS_STATUSES)('%s is our own word', (status) => {
		expect(readStatus(status)).toBe(status);
	});

	it.each([
		['accepted', 'queued'],
		['scheduled', 'queued'],
		['read', 'delivered'],
		['initiated', 'queued'],
		['ringing', 'sending'],
		['in-progress', 'sent'],
		['completed', 'delivered'],
		['busy', 'undelivered'],
		['no-answer', 'undelivered'],
		['canceled', 'undelivered'],
		['toString', null],
		['', null]
	])('%j is %s', (word, expected) => {
		expect(readStatus(word)).toBe(expected);
	});

	it('only two mean that it did not arrive', () => {
		expect(SMS_STATUSES.filter(hasFailed)).toEqual(['undelivered', 'failed']);
	});
});
