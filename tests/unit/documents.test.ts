import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { apiHandlers, pages } from '../support/route-files';

/**
 * What the documents name must exist: paths, links, scripts, functions, addresses, variables of the environment,
 * and the tests of docs/HAZARDS.md. In a path, `<area>` stands for any one name.
 */
const DOCUMENTS = [
	'README.md',
	'DEVELOPERS.md',
	...filesBelow('docs').filter((file) => file.endsWith('.md'))
];
const FOLDERS = ['.ci', 'docs', 'drizzle', 'src', 'static', 'tests'];
const FILES = FOLDERS.flatMap(filesBelow);
const SOURCE = FILES.filter((file) => /\.(ts|mjs|js|svelte)$/.test(file))
	.map((file) => readFileSync(file, 'utf8'))
	.join('\n');

function filesBelow(folder: string): string[] {
	return readdirSync(folder, { recursive: true, encoding: 'utf8' }).map((name) => path.join(folder, name));
}

interface Named {
	document: string;
	text: string;
}

/** What the first group of the pattern finds in each document, once for each. */
function found(pattern: RegExp): Named[] {
	return DOCUMENTS.flatMap((document) => {
		const texts = [...readFileSync(document, 'utf8').matchAll(pattern)].map(([, text = '']) => text);
		return [...new Set(texts)].map((text) => ({ document, text }));
	});
}

/** Every `code` in running text that fits. */
function spans(pattern: RegExp): Named[] {
	return found(/(?<!`)`([^`\n]+)`(?!`)/g).filter(({ text }) => pattern.test(text));
}

/** Those for which there is nothing. */
function missing(named: Named[], exists: (text: string, document: string) => boolean): string[] {
	expect(named.length).toBeGreaterThan(0);
	return named
		.filter(({ document, text }) => !exists(text, document))
		.map(({ document, text }) => `${document}: ${text}`);
}

function isThere(named: string): boolean {
	const name = named.replace(/\/$/, '');
	return name.includes('<') ? FILES.some((file) => anyName(name).test(file)) : existsSync(name);
}

function anyName(name: string): RegExp {
	return new RegExp(`^${name.split(/<\w+>/).map(literal).join('[^/]+')}$`);
}

function literal(text: string): string {
	return text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
}

describe('the documents', () => {
	it('name paths that are there', () => {
		const below = new RegExp(`^(${FOLDERS.map(literal).join('|')})/`);
		expect(missing(spans(below), isThere)).toEqual([]);
		expect(missing(spans(/^[\w-]+(\.config)?\.(json|js|ts|md)$/), isThere)).toEqual([]);
	});

	it('link to files that are there', () => {
		// The picture is made from the running product.
		const links = found(/\]\((?!https?:|docs\/pictures\/)([^)#]+)\)/g);
		const leads = (link: string, document: string) => existsSync(path.join(path.dirname(document), link));
		expect(missing(links, leads)).toEqual([]);
	});

	it('name npm scripts that are there', () => {
		const { scripts } = JSON.parse(readFileSync('package.json', 'utf8')) as { scripts: object };
		const commands = [...found(/\bnpm run ([\w:]+)/g), ...found(/\bnpm (test|start)\b/g)];
		expect(missing(commands, (name) => name in scripts)).toEqual([]);
	});

	it('name functions that are declared', () => {
		const declared = (call: string) => {
			const name = call.slice(0, -2);
			const ways = [`(function|const|class|async) ${name}\\b`, `^\\s+(override )?${name}[(<]`, `\\b${name}:`];
			return new RegExp(ways.join('|'), 'm').test(SOURCE);
		};
		expect(missing(spans(/^\w+\(\)$/), declared)).toEqual([]);
	});

	it('name addresses that are answered', () => {
		const handlers = apiHandlers();
		const addresses = [...pages().map(({ address }) => address), ...handlers.map((one) => one.split(' ')[1])];
		const answered = (text: string) => {
			const asked = text.replaceAll(/:(\w+)/g, '[$1]');
			return [...handlers, ...addresses].includes(asked) || existsSync(`src/routes${asked}/+server.ts`);
		};
		expect(missing(spans(/^((GET|POST|PUT|DELETE) )?\/[\w/:.-]+$/), answered)).toEqual([]);
	});

	it('name variables that the environment or the code has', () => {
		const all = `${readFileSync('.env.example', 'utf8')}\n${SOURCE}`;
		const known = (text: string) => new RegExp(`\\b${text.split('=')[0]}\\b`).test(all);
		expect(missing(spans(/^[A-Z]{3,}[A-Z0-9_]*(=\w+)?$/), known)).toEqual([]);
	});
});

describe('docs/HAZARDS.md', () => {
	const text = readFileSync('docs/HAZARDS.md', 'utf8');
	/** A file in code, then its titles in quotation marks. */
	const tests = [...text.matchAll(/`([^`]+\.ts)`((?:,? “[^”]+”)+)/g)].flatMap(([, file = '', titles = '']) =>
		[...titles.matchAll(/“([^”]+)”/g)].map(([, title = '']) => [file, title] as const)
	);

	it('names a test for each hazard, or says that there is none', () => {
		const hazards = text.split('\n').filter((line) => line.startsWith('| **'));
		expect(hazards.length).toBeGreaterThan(10);
		expect(hazards.filter((line) => !/\.ts` “|\| none \|/.test(line))).toEqual([]);
	});

	it.each(tests)('%s has “%s”', (file, title) => {
		const code = existsSync(file) ? readFileSync(file, 'utf8') : '';
		expect(code).toMatch(new RegExp(`\\(\\s*(['"\`])${literal(title)}\\1`));
	});
});
