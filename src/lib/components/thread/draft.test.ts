import { describe, expect, it } from 'vitest';
import { joined, keepDraft, keyFor, loadDraft, NO_DRAFT, type Store } from './draft';

function memory(): Store & { size(): number } {
	const kept = new Map<string, string>();
	return {
		getItem: (name) => kept.get(name) ?? null,
		setItem: (name, value) => void kept.set(name, value),
		removeItem: (name) => void kept.delete(name),
		size: () => kept.size
	};
}

describe('keyFor', () => {
	const tried = { body: 'Walked twice.', mention: '', key: 'first' };
	it.each([
		['Walked twice.', tried, 'first'],
		[' Walked twice.\n', tried, 'first'],
		['Walked thrice.', tried, 'fresh'],
		['', tried, 'fresh'],
		['Walked twice.', null, 'fresh']
	])('%j after %j goes out under the key %s', (body, before, key) => {
		expect(keyFor({ body, mention: '' }, before, 'fresh')).toBe(key);
	});

	it('the same words to somebody else are another entry', () => {
		expect(keyFor({ body: tried.body, mention: 'u1' }, tried, 'fresh')).toBe('fresh');
		expect(keyFor({ body: tried.body, mention: 'u1' }, { ...tried, mention: 'u1' }, 'fresh')).toBe('first');
	});
});

describe('a draft', () => {
	it('comes back for its own thread only', () => {
		const store = memory();
		const draft = { body: 'Half a sen', mention: 'u1', tried: { body: 'Half', mention: '', key: 'k1' } };
		keepDraft(store, 't1', draft);
		expect(loadDraft(store, 't1')).toEqual(draft);
		expect(loadDraft(store, 't2')).toEqual(NO_DRAFT);
	});

	it('leaves nothing behind once it is empty', () => {
		const store = memory();
		keepDraft(store, 't1', { body: 'x', mention: '', tried: null });
		keepDraft(store, 't1', NO_DRAFT);
		expect(store.size()).toBe(0);
	});

	it.each([
		'',
		'null',
		'{',
		'7',
		'{"body":1,"tried":null}',
		'{"body":"x"}',
		'{"body":"x","tried":null}',
		'{"body":"x","mention":"","tried":{"body":"x"}}'
	])('that cannot be read is none: %j', (text) => {
		const store = memory();
		store.setItem('ropewalk-draft-t1', text);
		expect(loadDraft(store, 't1')).toEqual(NO_DRAFT);
	});

	it('is not kept by a browser that refuses, and nothing fails', () => {
		const refuse = () => {
			throw new Error('full');
		};
		const store = { getItem: refuse, setItem: refuse, removeItem: refuse };
		keepDraft(store, 't1', { body: 'x', mention: '', tried: null });
		expect(loadDraft(store, 't1')).toEqual(NO_DRAFT);
	});
});

describe('a draft joined with what was entered before the page was ready', () => {
	const kept = { body: 'kept', mention: 'u1', tried: { body: 'kept', mention: 'u1', key: 'k1' } };
	const early = (body: string, mention = '') => ({ body, mention });
	it.each([
		['nothing kept, nothing typed', NO_DRAFT, early(''), NO_DRAFT],
		['kept alone', kept, early(''), kept],
		['typed alone', NO_DRAFT, early('typed', 'u2'), { body: 'typed', mention: 'u2', tried: null }],
		['the same in both', kept, early('kept'), kept],
		['one and another', kept, early('typed'), { ...kept, body: 'kept\ntyped' }],
		['another person to ask', kept, early('', 'u2'), { ...kept, mention: 'u2' }]
	])('%s', (_, draft, entered, expected) => {
		expect(joined(draft, entered)).toEqual(expected);
	});
});
