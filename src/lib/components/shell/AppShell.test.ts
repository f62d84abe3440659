import { createRawSnippet } from 'svelte';
import { render } from 'svelte/server';
import { describe, expect, it } from 'vitest';
import AppShell from './AppShell.svelte';

const now = Date.UTC(2025, 11, 1, 14, 2);
const base = {
	user: { name: 'I. Aldous', role: 'therapist' },
	units: [{ id: 'tern', name: 'Tern Ward' }],
	path: '/ward',
	connection: { connected: true, since: null },
	zone: 'Europe/Dublin',
	now,
	children: createRawSnippet(() => ({ render: () => '<p>The page</p>' }))
} as const;

const shell = (props: object = {}) => render(AppShell, { props: { ...base, ...props } }).body;
const text = (body: string) => body.replace(/<[^>]*>/g, ' ').replace(/\s+/g, ' ');

describe('AppShell', () => {
	it('has words on every place, so that a catalogue without words cannot pass', () => {
		const words = text(shell());
		for (const word of ['Loose ends', 'Ward', 'Visits', 'Cover', 'More', 'Sign out', 'Skip to the page']) {
			expect(words).toContain(word);
		}
		expect(words).not.toContain('undefined');
	});

	it('marks the place one is in, at the desk and on the phone', () => {
		expect(shell().match(/href="\/ward"[^>]*aria-current="page"/g)).toHaveLength(2);
	});

	it.each([
		[{ connected: true, since: null }, 'Connected'],
		[{ connected: false, since: null }, 'Not connected'],
		[{ connected: false, since: now }, 'Not connected since 14:02']
	])('says of %j: %s', (connection, words) => {
		expect(text(shell({ connection }))).toContain(words);
	});

	it.each([
		[0, false],
		[1, true],
		[12, true]
	])('with %d writes waiting says so: %s', (waiting, said) => {
		expect(text(shell({ waiting })).includes(`${waiting} to send`)).toBe(said);
	});

	it('signs out by a post, which no preview of a link can do', () => {
		expect(shell()).toMatch(/<form method="POST" action="\/sign-out"/);
	});
});
