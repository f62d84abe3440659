import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';

const CATALOGUE = 'src/lib/i18n/messages/en';
/** Where errors, findings and messages are worded. */
const ROOMS = ['src/lib/domain', 'src/lib/server'];

/**
 * Words that our own stand for, in every form they take. One thing has one word, so that nobody asks whether two words
 * mean two things; and a tired person reads the same word everywhere.
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
	'episode, as a noun': /\b(the|a|an|this|that|whose|open|whole) stays?\b|\bstay (is|was)\b/i,
	cover: /\brotas?\b/i,
	'loose ends': /\bdashboards?\b|\binbox(es)?\b|\bfeeds?\b/i,
	'told, heard': /\bnotif(y|ied|ications?)\b/i
};

/** The words of docs/GLOSSARY.md that are not used for anything: those in italics are, for something else. */
const UNUSED = readFileSync('docs/GLOSSARY.md', 'utf8')
	.split('\n')
	.map((line) => line.split('|').map((cell) => cell.trim()))
	.filter((cells) => cells.length === 5 && cells[3] !== 'not used' && !/^-+$/.test(cells[3] ?? ''))
	.flatMap(([, ours = '', , others = '']) =>
		others
			.replace(/;.*/, '')
			.split(',')
			.map((word) => [word.trim(), ours] as const)
	)
	.filter(([word]) => word !== '' && !word.includes('*'));

function messages(): [key: string, text: string][] {
	return readdirSync(CATALOGUE).flatMap((file) => {
		const area: Record<string, unknown> = JSON.parse(readFileSync(path.join(CATALOGUE, file), 'utf8'));
		return Object.entries(area).map(([key, text]): [string, string] => [key, JSON.stringify(text)]);
	});
}

/** Every sentence that is written into the code itself: errors, findings, texts and mails. */
function sentences(): [file: string, text: string][] {
	return ROOMS.flatMap((room) =>
		readdirSync(room, { recursive: true, encoding: 'utf8' })
			.filter((file) => file.endsWith('.ts') && !file.endsWith('.test.ts'))
			.flatMap((file) => sentencesOf(readFileSync(path.join(room, file), 'utf8')).map((text) => [file, text]))
	) as [string, string][];
}

/** What a file says in literals of at least two words, without what is written for the database. */
function sentencesOf(source: string): string[] {
	const found: string[] = [];
	const visit = (node: ts.Node): void => {
		if (ts.isTaggedTemplateExpression(node) && node.tag.getText() === 'sql') {
			return;
		}
		const literal =
			ts.isStringLiteralLike(node) || ts.isTemplateHead(node) || ts.isTemplateMiddleOrTemplateTail(node);
		if (literal && /\p{L} \p{L}/u.test(node.text)) {
			found.push(node.text);
		}
		ts.forEachChild(node, visit);
	};
	visit(ts.createSourceFile('one.ts', source, ts.ScriptTarget.Latest, true));
	return found;
}

const found = (word: string) => new RegExp(`\\b${word}(s|es)?\\b`, 'i');

describe('one word for one thing', () => {
	const said = [...messages(), ...sentences()];
	const saying = (pattern: RegExp) => said.filter(([, text]) => pattern.test(text));

	it('reads the whole catalogue, and what the code says itself', () => {
		expect(messages().length).toBeGreaterThan(800);
		expect(sentences().length).toBeGreaterThan(500);
		const source =
			'throw a(`The stay of ${who} is over`); sql`select case x`; say("one"); const b = "Not so";';
		expect(sentencesOf(source)).toEqual(['The stay of ', ' is over', 'Not so']);
	});

	it.each(Object.entries(NOT_OURS))('says "%s"', (_ours, pattern) => {
		expect(saying(pattern)).toEqual([]);
	});

	it.each(Object.entries(NOT_OURS))('would notice another word for "%s"', (_ours, pattern) => {
		const examples =
			'approved alerts acknowledged resolve to-do comments appointment logged in users deleted rota inbox notified ' +
			'approval authorised incident ticket chat log out delete dashboard feed notification the stay is over';
		expect(examples).toMatch(pattern);
	});

	it('reads the words of the glossary', () => {
		expect(UNUSED.length).toBeGreaterThan(60);
		expect(UNUSED.map(([word]) => word)).toContain('holiday');
		expect(UNUSED.map(([word]) => word)).not.toContain('stage');
	});

	it.each(UNUSED)('does not say "%s" where "%s" is the word', (word) => {
		expect(saying(found(word))).toEqual([]);
	});
});
