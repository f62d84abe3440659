import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { ensureBuilt } from './build.mjs';
import { ensureChromium } from './chromium.mjs';
import { countLine, countPlaywright, countsOf, countVitest, oneCheck } from './counts.mjs';
import { at, bin } from './paths.mjs';
import { run } from './run.mjs';

/**
 * @typedef {import('./counts.mjs').Counts} Counts
 *
 * @typedef {object} Step
 * @property {string} name
 * @property {() => Promise<Counts>} run
 * @property {string[]} [needs] names of steps without which this one cannot be run
 */

/** @typedef {import('./run.mjs').Output} Output */

const LIMIT_MS = 20 * 60 * 1000;

/** Variables that would point tests at a person's own server or data. */
const NOT_FOR_TESTS = [
	'DATABASE_URL',
	'DATA_DIR',
	'DEMO',
	'NODE_ENV',
	'ORIGIN',
	'PUBLIC_URL',
	'TEST_CLOCK',
	'TEST_CLOCK_AT'
];

/**
 * All of `npm test` after the packages are installed, in order. Steps in a list of their own run at once: each of them
 * keeps one core busy.
 * @type {(Step | Step[])[]}
 */
export const STEPS = [
	{ name: 'Chromium', run: async () => oneCheck(await ensureChromium()) },
	check('generated code', [
		[
			'paraglide-js',
			'compile',
			...['--project', './src/lib/i18n/project.inlang'],
			...['--outdir', './src/lib/i18n/paraglide'],
			...['--strategy', 'cookie', 'baseLocale', '--silent']
		],
		['svelte-kit', 'sync']
	]),
	[
		check('format', [['prettier', '--check', '.']], 'hold'),
		check('lint', [['eslint', '.']], 'hold'),
		// Checks each plain file of tsconfig.json as well: the compiler alone would look at the same files again.
		check('types', [['svelte-check', '--fail-on-warnings']], 'hold')
	],
	check('migrations', [['drizzle-kit', 'check']]),
	{ name: 'unit and integration', run: () => runVitest(['unit', 'integration']) },
	{ name: 'build', run: async () => oneCheck(await ensureBuilt()) },
	{ name: 'weight', run: runWeigh, needs: ['build'] },
	{ name: 'product', run: () => runVitest(['product']), needs: ['build'] },
	{ name: 'crash', run: runCrash, needs: ['build'] },
	{ name: 'journeys', run: runPlaywright, needs: ['build', 'Chromium'] }
];

/**
 * A step of programs that pass or fail as a whole; the first that fails ends it.
 * @param {string} name
 * @param {string[][]} commands a program of an installed package and its arguments
 * @param {Output} [output] what becomes of what they print
 * @returns {Step}
 */
function check(name, commands, output = 'show') {
	return {
		name,
		run: async () => {
			for (const [program = '', ...args] of commands) {
				const { code } = await run(bin(program), args, { env: testEnv(), limitMs: LIMIT_MS, output });
				if (code !== 0) {
					return oneCheck(false);
				}
			}
			return oneCheck(true);
		}
	};
}

/** @returns {NodeJS.ProcessEnv} */
function testEnv() {
	const kept = Object.entries(process.env).filter(([name]) => !NOT_FOR_TESTS.includes(name));
	return Object.fromEntries(kept);
}

/** @param {string[]} names of Vitest's projects */
function runVitest(names) {
	return withReport(async (file) => {
		const projects = names.flatMap((name) => ['--project', name]);
		const reporters = ['--reporter', 'default', '--reporter', 'json', `--outputFile.json=${file}`];
		const args = ['run', ...projects, ...reporters];
		const { code } = await run(bin('vitest'), args, { env: testEnv(), limitMs: LIMIT_MS });
		return countsOf(code, () => countVitest(readJson(file)));
	});
}

async function runWeigh() {
	const { code } = await run(process.execPath, [at('src', 'cli', 'weigh.mjs')], { env: testEnv() });
	return oneCheck(code === 0);
}

async function runCrash() {
	if (!existsSync(at('tests', 'crash', 'main.ts'))) {
		return { passed: 0, failed: 0, skipped: 0 };
	}
	const args = ['--import', 'tsx', 'tests/crash/main.ts', '--short'];
	const { code, output } = await run(process.execPath, args, {
		env: testEnv(),
		limitMs: LIMIT_MS,
		output: 'keep'
	});
	return countsOf(code, () => countLine(output));
}

function runPlaywright() {
	return withReport(async (file) => {
		const args = ['test', '--config', 'tests/playwright.config.ts'];
		const env = { ...testEnv(), JOURNEYS_REPORT: file };
		const { code } = await run(bin('playwright'), args, { env, limitMs: LIMIT_MS });
		return countsOf(code, () => countPlaywright(readJson(file)));
	});
}

/**
 * @param {(file: string) => Promise<Counts>} use gets the name of a file for a report, which is gone afterwards
 */
async function withReport(use) {
	const folder = mkdtempSync(path.join(tmpdir(), 'ropewalk-report-'));
	try {
		return await use(path.join(folder, 'report.json'));
	} finally {
		rmSync(folder, { recursive: true, force: true });
	}
}

/** @param {string} file */
function readJson(file) {
	return JSON.parse(readFileSync(file, 'utf8'));
}
