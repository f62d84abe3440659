import { render } from 'svelte/server';
import { describe, expect, it } from 'vitest';
import DeliveryStrip from './DeliveryStrip.svelte';

const SINCE = '2025-12-01T14:02:00.000Z';
const words = (items: { channel: 'sms' | 'mail'; since: string; waiting: number }[]) =>
	render(DeliveryStrip, { props: { items, zone: 'Europe/Dublin' } })
		.body.replace(/<[^>]*>/g, ' ')
		.replace(/\s+/g, ' ')
		.trim();

describe('DeliveryStrip', () => {
	it('says what does not go out, since when, what to do instead and how many wait', () => {
		const text = words([{ channel: 'sms', since: SINCE, waiting: 3 }]);
		expect(text).toContain('Text messages have not been going out since 14:02.');
		expect(text).toContain('call whoever is needed yourself');
		expect(text).toContain('Waiting to go out: 3.');
	});

	it('names no number when nothing waits, and each way out by itself', () => {
		const text = words([
			{ channel: 'sms', since: SINCE, waiting: 0 },
			{ channel: 'mail', since: SINCE, waiting: 1 }
		]);
		expect(text.match(/Waiting to go out/g)).toHaveLength(1);
		expect(text).toContain('Mails have not been going out since 14:02.');
	});

	it('shows nothing when all is well', () => {
		expect(words([])).toBe('');
	});
});
