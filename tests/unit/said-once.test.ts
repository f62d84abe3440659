import { readdirSync, readFileSync } from 'node:fs';
import { parse, type AST } from 'svelte/compiler';
import { describe, expect, it } from 'vitest';
import { LOOKS, lookedLike } from './looks';
import { saidTwice } from './said-twice';

/** A use of a part that is given a class: the part's own possible looks, and every run of classes it may be given. */
type Use = { file: string; part: string; given: string[]; props: Record<string, readonly unknown[]> };

const OWN_PARTS = readdirSync('src/lib/components/ui')
	.filter((file) => file.endsWith('.svelte'))
	.map((file) => file.slice(0, -'.svelte'.length));

const files = readdirSync('src', { recursive: true, encoding: 'utf8' }).map(
	(file) => `src/${file.replaceAll('\\', '/')}`
);
const pages = files.filter((file) => file.endsWith('.svelte'));
const tables = files.filter((file) => file.startsWith('src/lib/components/') && file.endsWith('.ts'));

/** Every text within an expression, whichever of them it comes to in the end. */
function textsIn(node: unknown): string[] {
	if (Array.isArray(node)) {
		return node.flatMap(textsIn);
	}
	if (node === null || typeof node !== 'object') {
		return [];
	}
	const { type, value, data } = node as { type?: string; value?: unknown; data?: string };
	if (type === 'Text') {
		return [data ?? ''];
	}
	return type === 'Literal' && typeof value === 'string' ? [value] : Object.values(node).flatMap(textsIn);
}

function componentsIn(node: unknown): AST.Component[] {
	if (node === null || typeof node !== 'object') {
		return [];
	}
	const within = Object.values(node).flatMap(componentsIn);
	return (node as { type?: string }).type === 'Component' ? [node as AST.Component, ...within] : within;
}

/** What a look can be at this use: as written there, or all of it where that is only known while it runs. */
function choicesOf(component: AST.Component, name: string, all: readonly unknown[]): readonly unknown[] {
	const spread = component.attributes.some(({ type }) => type === 'SpreadAttribute');
	const said = component.attributes.find(
		(attribute): attribute is AST.Attribute => attribute.type === 'Attribute' && attribute.name === name
	);
	if (!said) {
		return spread ? all : [undefined];
	}
	const named = said.value === true ? [true] : textsIn(said.value).filter((text) => all.includes(text));
	return named.length > 0 ? named : all;
}

function usesIn(file: string): Use[] {
	return componentsIn(parse(readFileSync(file, 'utf8'), { modern: true }).fragment)
		.filter(({ name }) => OWN_PARTS.includes(name))
		.flatMap((component) => {
			const written = component.attributes.find((each) => each.type === 'Attribute' && each.name === 'class');
			const looks = Object.entries(LOOKS[component.name]?.looks ?? {});
			const props = looks.map(([name, all]) => [name, choicesOf(component, name, all)] as const);
			return written
				? [{ file, part: component.name, given: textsIn(written), props: Object.fromEntries(props) }]
				: [];
		});
}

const uses = pages.flatMap(usesIn);

/** What the page of parts shows of a look; what is not said there is as the part has it by itself. */
function shownLooks(part: string, name: string, all: readonly unknown[]): Set<unknown> {
	const source = readFileSync(`src/lib/components/ui/${part}.svelte`, 'utf8');
	const byItself = new RegExp(`\\b${name} = '([^']+)'`).exec(source)?.[1] ?? all[0];
	const drawn = pages
		.filter((file) => file.startsWith('src/routes/style/'))
		.flatMap((file) => componentsIn(parse(readFileSync(file, 'utf8'), { modern: true }).fragment))
		.filter((component) => component.name === part);
	const shown = drawn.flatMap((component) => choicesOf(component, name, all));
	return new Set(shown.map((look) => look ?? byItself));
}

describe('what is said twice', () => {
	it.each([
		['min-h-touch px-3 text-ink', 'min-h-thumb px-2 text-high', ['min-h-touch', 'px-3', 'text-ink']],
		['text-body leading-5', 'text-fine', ['text-body']],
		['rounded bg-transparent', 'rounded-phone bg-canvas', ['rounded', 'bg-transparent']],
		['font-bold', 'font-bold', ['font-bold']],
		['px-3 text-ink hover:text-soft', 'mt-4 pr-12 md:px-2 text-fine', []]
	])('%s, then %s', (look, given, dropped) => {
		expect(saidTwice(look, given)).toEqual(dropped);
	});
});

describe('a part of the page', () => {
	it.each(Object.keys(LOOKS))('%s says nothing twice itself, however it looks', (part) => {
		const twice = lookedLike(part, LOOKS[part]?.looks ?? {}).flatMap(({ all }) =>
			all.flatMap((look) => saidTwice(look))
		);
		expect(twice).toEqual([]);
	});

	it('is given a class to place it, and none that its own look has to fight', () => {
		expect(uses.length).toBeGreaterThan(100);
		const fought = uses.flatMap(({ file, part, given, props }) =>
			lookedLike(part, props).flatMap(({ root }) =>
				given.flatMap((classes) => saidTwice(root, classes).map((word) => `${file}: ${part}: ${word}`))
			)
		);
		expect([...new Set(fought)]).toEqual([]);
	});

	it('stands on the page of parts in every look that a page gives it', () => {
		const given = Object.entries(LOOKS).flatMap(([part, { looks = {} }]) =>
			Object.entries(looks).map(([name, all]) => ({ part, name, all, shown: shownLooks(part, name, all) }))
		);
		expect(given.length).toBeGreaterThan(15);
		const missing = given.flatMap(({ part, name, all, shown }) =>
			all.filter((look) => !shown.has(look)).map((look) => `${part}: ${name} ${String(look)}`)
		);
		expect(missing).toEqual([]);
	});

	it('never has to shout', () => {
		const shouted = [...pages, ...tables].flatMap((file) =>
			[...readFileSync(file, 'utf8').matchAll(/(?<=["'` ])[a-z][-\w:[\]&>.]*-[\w\]]+!(?=["'` ])/g)].map(
				([word]) => `${file}: ${word}`
			)
		);
		expect(shouted).toEqual([]);
	});

	/** What `app.css` gives by itself to a heading of this rank, and to a list of ruled rows. */
	const GIVEN: [RegExp, string[]][] = [
		[/<h1\b[^>]*?class="([^"]*)"/g, ['text-head', 'font-black']],
		[/<h2\b[^>]*?class="([^"]*)"/g, ['text-title', 'font-black']],
		[/<h3\b[^>]*?class="([^"]*)"/g, ['text-row', 'font-black']],
		[/["']([^"']*divide-y[^"']*border-y|[^"']*border-y[^"']*divide-y)/g, ['divide-y']]
	];

	it('leaves to the sheet what it gives to headings and to rows', () => {
		const again = pages.flatMap((file) =>
			GIVEN.flatMap(([tag, given]) =>
				[...readFileSync(file, 'utf8').matchAll(tag)].flatMap(([, classes = '']) =>
					classes.split(' ').flatMap((word) => (given.includes(word) ? [`${file}: ${word}`] : []))
				)
			)
		);
		expect(again).toEqual([]);
	});
});
