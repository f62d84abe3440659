import { render } from 'svelte/server';
import { expect, it } from 'vitest';
import RowAction from './RowAction.svelte';

/** A page that no form has come back to. */
const PAGE = new Map([
	['__request__', { page: { form: null, url: new URL('https://ropewalk.example/account') } }]
]);

function keyOf(id?: string): string | undefined {
	const props = { action: '?/revoke', key: 'page-key', label: 'Revoke', ...(id === undefined ? {} : { id }) };
	return /name="key" value="([^"]*)"/.exec(render(RowAction, { props, context: PAGE }).body)?.[1];
}

it('is one write for each row of a page, and always the same for the same row', () => {
	expect(keyOf('a')).not.toBe(keyOf('b'));
	expect(keyOf('a')).toBe(keyOf('a'));
	expect(keyOf()).toBe('page-key');
});
