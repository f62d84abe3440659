import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { parse, type AST } from 'svelte/compiler';
import { describe, expect, it } from 'vitest';

const CATALOGUE = 'src/lib/i18n/messages/en';

/** Attributes that a person reads or hears. */
const SPOKEN = new Set(
	(
		'label title placeholder aria-label alt hint text caption submit description term aside question filterLabel ' +
		'about unit words'
	).split(' ')
);

/** Where words may stand in the markup: the page for those who build pages, and the name of the product. */
const EXEMPT = /^src\/routes\/(style|phones)\//;

function templates(): string[] {
	return readdirSync('src', { recursive: true, encoding: 'utf8' })
		.filter((file) => file.endsWith('.svelte'))
		.map((file) => `src/${file}`)
		.filter((file) => !EXEMPT.test(file));
}

/** Two letters in a row are a word; a unit, a sign or a dash is none. */
const isWord = (text: string) => /\p{L}{2}/u.test(text.replace(/&\w+;/g, ''));

/** Words written into the markup of a component instead of the catalogue. */
function wordsInMarkup(source: string): string[] {
	const found: string[] = [];
	const visit = (node: unknown): void => {
		if (Array.isArray(node)) {
			node.forEach(visit);
		} else if (node !== null && typeof node === 'object') {
			const { type } = node as { type?: string };
			if (type === 'Text' && isWord((node as AST.Text).data)) {
				found.push((node as AST.Text).data.trim());
			}
			if (type === 'Attribute') {
				const { name, value } = node as AST.Attribute;
				return SPOKEN.has(name) ? visit(value) : undefined;
			}
			if (type === 'StyleDirective') {
				return;
			}
			if (type === 'RegularElement' && ['style', 'script'].includes((node as AST.RegularElement).name)) {
				return;
			}
			Object.values(node).forEach(visit);
		}
	};
	visit(parse(source, { modern: true }).fragment);
	return found;
}

describe('words of the pages', () => {
	it('are found where they stand in the markup', () => {
		expect(wordsInMarkup('<p class="x">Hello</p><Field label="Bed" name="bed" />{1} kg')).toEqual([
			'Hello',
			'Bed',
			'kg'
		]);
	});

	// Every template of the product is parsed, which takes a busy machine longer than the usual limit.
	it('come from the catalogue', { timeout: 30_000 }, () => {
		const written = templates()
			.map((file) => [file, wordsInMarkup(readFileSync(file, 'utf8'))] as const)
			.filter(([, words]) => words.length > 0);
		expect(written).toEqual([]);
	});
});

describe('Spanish, as far as it has come', () => {
	const SPANISH = CATALOGUE.replace(/en$/, 'es');
	const read = (folder: string, file: string): Record<string, string> =>
		JSON.parse(readFileSync(path.join(folder, file), 'utf8'));
	const blanks = (text = '') => [...text.matchAll(/\{\w+\}/g)].map(([blank]) => blank).sort();

	it.each(readdirSync(SPANISH))(
		'%s has whole sentences for words of ours, each with the same blanks',
		(file) => {
			const [english, spanish] = [read(CATALOGUE, file), read(SPANISH, file)];
			expect(Object.keys(spanish).length).toBeGreaterThan(20);
			const other = Object.entries(spanish).filter(
				([key, text]) =>
					!(key in english) || blanks(text).join() !== blanks(english[key]).join() || text.trim() === ''
			);
			expect(other).toEqual([]);
		}
	);

	/** Pages that are wholly in Spanish, with their parts; a page that mixes two languages has half sentences. */
	const PAGES: Record<string, RegExp> = {
		'the shell': /^src\/lib\/components\/shell\//,
		'the page that a link on a phone opens':
			/^src\/(routes\/\(phone\)\/|lib\/components\/escalations\/(Phone|SinceClock))/,
		'loose ends':
			/^src\/(routes\/\(app\)\/loose-ends\/\+page\.svelte|lib\/components\/loose-ends\/(EndMark|LooseEndRow|WaitingOnYou|YouWaitFor|words\.ts|steps\.ts))/
	};

	it.each(Object.entries(PAGES))('says everything on %s', (_, pattern) => {
		const spanish = Object.assign({}, ...readdirSync(SPANISH).map((file) => read(SPANISH, file)));
		const said = readdirSync('src', { recursive: true, encoding: 'utf8' })
			.map((file) => `src/${file}`)
			.filter((file) => pattern.test(file) && /\.(svelte|ts)$/.test(file) && !file.endsWith('.test.ts'))
			.flatMap((file) =>
				[...readFileSync(file, 'utf8').matchAll(/\bm\.(\w+_\w+)/g)].map(([, key = '']) => key)
			);
		expect(said.length).toBeGreaterThan(5);
		expect([...new Set(said)].filter((key) => !(key in spanish))).toEqual([]);
	});
});
