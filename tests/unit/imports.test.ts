import { ESLint, type Linter } from 'eslint';
import { describe, expect, it } from 'vitest';
import config from '../../eslint.config.js';

/**
 * The import directions and the clock rule of `eslint.config.js`, on code that keeps them and code that breaks
 * them. Only the two rules in question run, so that no sample has to be part of the compiled program.
 */
const RULES = ['no-restricted-imports', 'no-restricted-syntax'];
const eslint = new ESLint({
	overrideConfig: { languageOptions: { parserOptions: { projectService: false } } },
	ruleFilter: ({ ruleId }) => RULES.includes(ruleId)
});

/** A room of the table: a file in it, what it may import, and what it must not. */
interface Room {
	file: string;
	good: string[];
	bad: string[];
}

/** By the globs of the row, joined, as the row itself has them. */
const ROOMS: Record<string, Room[]> = {
	'src/lib/domain/**/*.ts': [
		{
			file: 'src/lib/domain/visits/sample.ts',
			good: ['zod', '../core/codes', '$lib/domain/core/time', '@internationalized/date'],
			bad: [
				'$lib/server/db',
				'../../server/write',
				'../../client/api',
				'$lib/components/ui/Button.svelte',
				'$lib/i18n/paraglide/messages',
				'$lib/routes',
				'$app/environment',
				'$env/static/private',
				'@sveltejs/kit',
				'node:crypto',
				'drizzle-orm',
				'@libsql/client/sqlite3'
			]
		}
	],
	'src/lib/server/**/*.ts': [
		{
			file: 'src/lib/server/visits/sample.ts',
			good: ['$lib/domain/core/codes', '../db', 'node:crypto', 'drizzle-orm', '$lib/i18n/paraglide/messages'],
			bad: ['$lib/client/api', '../../client/queries', '$lib/components/ui/Button.svelte']
		}
	],
	'src/lib/client/**/*.ts': [
		{
			file: 'src/lib/client/sample.svelte.ts',
			good: ['$lib/domain/live/events', '$app/environment', './api', '$lib/routes'],
			bad: ['$lib/server/clock', '../server/clock', '$lib/components/ui/chip', 'node:crypto', 'drizzle-orm']
		}
	],
	'src/lib/components/**/*.{ts,svelte} src/routes/**/*.svelte': [
		{
			file: 'src/lib/components/escalations/Sample.svelte',
			good: ['$lib/domain/core/codes', '$lib/client/api', '../ui/Button.svelte', '$lib/i18n/labels'],
			bad: ['$lib/server/read', '../../server/read', 'node:path', 'drizzle-orm', '@libsql/client']
		},
		{
			file: 'src/lib/components/escalations/sample.ts',
			good: ['$lib/domain/core/codes'],
			bad: ['$lib/server/read', 'node:path']
		},
		{
			file: 'src/routes/(app)/sample/+page.svelte',
			good: ['$lib/domain/core/codes', '$lib/client/queries', '$lib/components/ui/Time.svelte', './$types'],
			bad: ['$lib/server/read', '$lib/server', 'node:path', 'drizzle-orm']
		}
	],
	'src/lib/components/{ui,form,rope}/**/*.{ts,svelte}': [
		{
			file: 'src/lib/components/ui/Sample.svelte',
			good: ['./chip', '$lib/format', '$lib/i18n/paraglide/messages'],
			bad: ['$lib/domain/core/codes', '$lib/client/api', '../../client/api', '$lib/server/read', 'node:path']
		},
		{
			file: 'src/lib/components/rope/sample.ts',
			good: ['./geometry'],
			bad: ['$lib/domain/core/codes', '../../domain/core/codes', 'drizzle-orm']
		}
	],
	'src/routes/**/*.ts src/hooks.server.ts': [
		{
			file: 'src/routes/api/sample/+server.ts',
			good: ['$lib/server/http/endpoint', '$lib/domain/referrals/forms', '@sveltejs/kit', '$lib/routes'],
			bad: [
				'$lib/server/db',
				'$lib/server/db/schema',
				'../../../lib/server/db',
				'drizzle-orm',
				'@libsql/client'
			]
		},
		{
			file: 'src/hooks.server.ts',
			good: ['$lib/server/start'],
			bad: ['$lib/server/db', './lib/../server/db/schema', 'drizzle-orm']
		}
	],
	'src/fakes/**/*.ts': [
		{
			file: 'src/fakes/gateway/sample.ts',
			good: ['node:http', '../common/http', 'smtp-server'],
			bad: [
				'$lib/server/env',
				'../../lib/server/env',
				'../../lib/domain/core/codes',
				'../../lib/client/api',
				'../../lib/components/ui/chip',
				'$app/environment',
				'@sveltejs/kit'
			]
		}
	]
};

/** Lint a sample as if it stood in the file, and answer the rules that it breaks. */
async function broken(file: string, code: string): Promise<(string | null)[]> {
	const [result] = await eslint.lintText(
		file.endsWith('.svelte') ? `<script lang="ts">${code}</script>` : code,
		{
			filePath: file
		}
	);
	return result?.messages.map(({ ruleId }) => ruleId) ?? ['not linted'];
}

const cases = (side: 'good' | 'bad') =>
	Object.values(ROOMS).flatMap((rooms) =>
		rooms.flatMap((room) => room[side].map((name) => [room.file, name]))
	);

describe('the table of rooms', () => {
	it('has samples for each of its rows', () => {
		const rows = (config as Linter.Config[])
			.filter(({ rules }) => rules?.['no-restricted-imports'])
			.map(({ files }) => files?.join(' '));
		expect(rows.toSorted()).toEqual(Object.keys(ROOMS).toSorted());
	});

	it.each(cases('good'))('lets %s import %s', async (file = '', name) => {
		expect(await broken(file, `import { sample } from '${name}';`)).toEqual([]);
	});

	it.each(cases('bad'))('keeps %s from importing %s', async (file = '', name) => {
		expect(await broken(file, `import { sample } from '${name}';`)).toEqual(['no-restricted-imports']);
	});

	it.each([
		["import type { Row } from '$lib/server/db/schema';"],
		["export { now } from '$lib/server/clock';"],
		["export * from '$lib/server/clock';"]
	])('counts types and what is passed on: %s', async (code) => {
		expect(await broken('src/lib/client/sample.ts', code)).toEqual(['no-restricted-imports']);
	});
});

describe('the clock', () => {
	const READS = ['const at = Date.now();', 'const at = new Date();'];

	it.each(
		[
			'src/lib/domain/visits/sample.ts',
			'src/lib/server/visits/sample.ts',
			'src/lib/components/ui/Sample.svelte',
			'src/routes/(app)/sample/+page.svelte',
			'src/hooks.server.ts'
		].flatMap((file) => READS.map((code) => [file, code]))
	)('is not read in %s by %s', async (file = '', code = '') => {
		expect(await broken(file, code)).toEqual(['no-restricted-syntax']);
	});

	it.each([
		'src/lib/server/clock.ts',
		'src/lib/client/sample.ts',
		'src/fakes/sample.ts',
		'src/lib/domain/visits/sample.test.ts'
	])('may be read in %s', async (file) => {
		expect(await broken(file, READS.join('\n').replace('at = new', 'date = new'))).toEqual([]);
	});

	it.each([
		'const at = new Date(0);',
		"const at = new Date('2026-03-03');",
		"const at = Date.parse('2026-03-03');"
	])('is not meant by %s', async (code) => {
		expect(await broken('src/lib/domain/visits/sample.ts', code)).toEqual([]);
	});
});
