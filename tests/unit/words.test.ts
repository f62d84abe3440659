import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { parse, type AST } from 'svelte/compiler';
import { describe, expect, it } from 'vitest';
import { PROBLEMS } from '../../src/lib/domain/core/errors';

const CATALOGUE = 'src/lib/i18n/messages/en';

/**
 * Words that our own stand for. One thing has one word, so that nobody asks whether two words mean two things; and
 * a tired person reads the same word everywhere.
 */
const NOT_OURS: Record<string, RegExp> = {
	'clearance: cleared, not cleared': /\bapprov(e|es|ed|al)\b|\bauthoris(e|ed|ation)\b/i,
	escalation: /\balerts?\b|\bincidents?\b/i,
	taken: /\backnowledg\w*/i,
	settled: /\bresolv(e|ed|es)\b/i,
	'loose end': /\bto-?dos?\b|\btickets?\b|\bbacklog\b/i,
	entry: /\bcomments?\b|\bchats?\b/i,
	visit: /\bappointments?\b/i,
	'sign in, sign out': /\blog(ged)? ?(in|out|on|off)\b|\blog-?(in|out)\b/i,
	'a person, by name or role': /\busers?\b/i,
	'withdrawn, amended, closed': /\bdelet(e|ed|es)\b/i,
	cover: /\brotas?\b/i,
	'loose ends': /\bdashboards?\b|\binbox(es)?\b|\bfeeds?\b/i,
	'told, heard': /\bnotif(y|ied|ications?)\b/i
};

function messages(): [key: string, text: string][] {
	return readdirSync(CATALOGUE).flatMap((file) => {
		const area: Record<string, unknown> = JSON.parse(readFileSync(path.join(CATALOGUE, file), 'utf8'));
		return Object.entries(area).map(([key, text]): [string, string] => [key, JSON.stringify(text)]);
	});
}

describe('one word for one thing', () => {
	const said = [...messages(), ...Object.entries(PROBLEMS).map(([key, text]) => [key, JSON.stringify(text)])];

	it('reads the whole catalogue', () => {
		expect(said.length).toBeGreaterThan(800);
	});

	it.each(Object.entries(NOT_OURS))('says "%s"', (_ours, pattern) => {
		expect(said.filter(([, text]) => pattern.test(text ?? ''))).toEqual([]);
	});

	it.each(Object.entries(NOT_OURS))('would notice another word for "%s"', (_ours, pattern) => {
		const examples =
			'approved alerts acknowledged resolve to-do comments appointment logged in users deleted rota inbox notified ' +
			'approval authorised incident ticket chat log out delete dashboard feed notification';
		expect(examples).toMatch(pattern);
	});
});

/** Attributes that a person reads or hears. */
const SPOKEN = new Set(['label', 'title', 'placeholder', 'aria-label', 'alt', 'hint', 'text', 'caption']);

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
