// @vitest-environment jsdom
import { afterEach, describe, expect, it } from 'vitest';
import { typedEarly } from './typed-early';

const PAGE = `
	<input id="text" value="sent" />
	<input id="hidden" type="hidden" value="key" />
	<input id="date" type="date" />
	<textarea id="area"></textarea>
	<input id="soon" type="radio" name="priority" value="soon" />
	<input id="routine" type="radio" name="priority" value="routine" checked />
	<input id="consent" type="checkbox" checked />
	<details id="fold"><summary>More</summary></details>
	<select id="list"><option value="a">A</option><option value="b">B</option></select>
	<select id="chosen"><option value="a">A</option><option value="b" selected>B</option></select>`;

type Field = HTMLInputElement & HTMLSelectElement & HTMLDetailsElement;
const field = (id: string) => document.getElementById(id) as Field;
const page = () => (document.body.innerHTML = PAGE);
const ids = () => typedEarly(document).map(({ control }) => control.id);

afterEach(() => (document.body.innerHTML = ''));

/** What a person does to a control, and what the page's own state then does to it. */
const CASES: [
	id: string,
	person: (at: Field) => void,
	page: (at: Field) => void,
	kept: (at: Field) => unknown
][] = [
	['text', (at) => (at.value = 'typed'), (at) => (at.value = 'sent'), (at) => at.value === 'typed'],
	['text', (at) => (at.value = ''), (at) => (at.value = 'sent'), (at) => at.value === ''],
	['date', (at) => (at.value = '2025-12-01'), (at) => (at.value = ''), (at) => at.value === '2025-12-01'],
	['area', (at) => (at.value = 'typed'), (at) => (at.value = ''), (at) => at.value === 'typed'],
	['soon', (at) => (at.checked = true), () => (field('routine').checked = true), (at) => at.checked],
	['consent', (at) => (at.checked = false), (at) => (at.checked = true), (at) => !at.checked],
	['list', (at) => (at.value = 'b'), (at) => (at.value = 'a'), (at) => at.value === 'b'],
	['chosen', (at) => (at.value = 'a'), (at) => (at.value = 'b'), (at) => at.value === 'a']
];

describe('what was entered before script took over', () => {
	it('is nothing on a page that nobody touched', () => {
		page();
		expect(ids()).toEqual([]);
	});

	it('is a fold that somebody opened', () => {
		page();
		field('fold').open = true;
		const early = typedEarly(document);
		field('fold').open = false;
		early.forEach((entered) => entered.giveBack());
		expect(field('fold').open).toBe(true);
	});

	it.each(CASES)('is put back into #%s, and told to who listens', (id, person, takeOver, kept) => {
		page();
		person(field(id));
		const early = typedEarly(document);
		takeOver(field(id));
		const heard: string[] = [];
		for (const kind of ['input', 'change']) {
			document.body.addEventListener(kind, ({ target }) => heard.push(`${kind} ${(target as Field).id}`));
		}
		early.forEach((entered) => entered.giveBack());
		expect(kept(field(id))).toBe(true);
		expect(heard).toEqual([`input ${id}`, `change ${id}`]);
	});

	it('does not take a button or a hidden field for an entry', () => {
		page();
		field('hidden').value = 'another';
		expect(ids()).toEqual([]);
	});

	it('leaves the caret where it was', () => {
		page();
		field('text').focus();
		field('text').value = 'typed';
		field('text').setSelectionRange(2, 2);
		const early = typedEarly(document);
		field('text').value = 'sent';
		early.forEach((entered) => entered.giveBack());
		expect(field('text').selectionStart).toBe(2);
	});
});
