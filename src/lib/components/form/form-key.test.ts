import { expect, it } from 'vitest';
import { FormKey } from './form-key.svelte';

/** A form on a page that can be loaded anew, which brings a key each time. */
function onPage() {
	let given = 'first';
	const key = new FormKey(() => given);
	return { key, reload: () => void (given = 'second') };
}

it('is that of the page as long as nothing is sent', () => {
	const { key, reload } = onPage();
	expect(key.current).toBe('first');
	reload();
	expect(key.current).toBe('second');
});

it('stays while nobody knows what became of it, whatever the page brings meanwhile', () => {
	const { key, reload } = onPage();
	key.hold();
	reload();
	key.hold();
	expect(key.current).toBe('first');
});

it('is another once it was taken, or a person sends another as well, and stays that again', () => {
	const { key, reload } = onPage();
	key.hold();
	key.renew();
	const next = key.current;
	expect(['first', 'second']).not.toContain(next);
	key.hold();
	reload();
	expect(key.current).toBe(next);
	key.renew();
	expect(key.current).not.toBe(next);
});
