import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { hashOf } from './hash.mjs';
import { at, bin, ROOT } from './paths.mjs';
import { run } from './run.mjs';

const MARKER = at('build', '.ropewalk-sources');
const ENTRY = at('build', 'index.js');

const SOURCES = [
	'src',
	'static',
	'drizzle',
	'package.json',
	'package-lock.json',
	'svelte.config.js',
	'tailwind.config.ts',
	'tsconfig.json',
	'vite.config.ts'
];

/** Where the server is started from. */
export function hasBuild() {
	return existsSync(ENTRY);
}

/**
 * Builds the application, unless the last build was made of the same sources.
 * @returns {Promise<boolean>} whether there is a build of these sources
 */
export async function ensureBuilt() {
	const wanted = hashOf(ROOT, SOURCES, isNoSource);
	if (hasBuild() && existsSync(MARKER) && readFileSync(MARKER, 'utf8') === wanted) {
		return true;
	}
	console.log('Building ...');
	const { code } = await run(bin('vite'), ['build'], { output: 'hold' });
	if (code !== 0) {
		console.error(`The build failed with code ${code}.`);
		return false;
	}
	writeFileSync(MARKER, wanted);
	return true;
}

/**
 * What lies among the sources but is made by tools, tests them, or runs beside the built application.
 * @param {string} name
 */
export function isNoSource(name) {
	return (
		name === 'src/cli' ||
		name === 'src/fakes' ||
		name === 'src/lib/i18n/paraglide' ||
		name === 'src/lib/i18n/project.inlang/cache' ||
		name.endsWith('.test.ts')
	);
}
