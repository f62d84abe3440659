import { closingLine, oneCheck, sum } from './lib/counts.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { STEPS } from './lib/steps.mjs';
import { tableOf } from './lib/table.mjs';

/**
 * `npm test`: installs what is missing, runs every step, a failed one too many or not, and closes with the plain line
 * `N passed, N failed`, which is the last thing it prints.
 */

/** @typedef {import('./lib/counts.mjs').Counts} Counts */
/** @typedef {{ name: string, counts: Counts, ms: number, note: string }} Result */

/** @type {Result[]} */
const results = [];
const installed = await time('packages', async () => oneCheck(await ensureInstalled()));
if (installed.counts.failed === 0) {
	for (const together of STEPS) {
		await Promise.all([together].flat().map(take));
	}
}
const total = sum(results.map(({ counts }) => counts));
console.log(`\n${tableOf(results)}\n`);
console.log(closingLine(total));
process.exitCode = total.failed > 0 ? 1 : 0;

/** @param {import('./lib/steps.mjs').Step} step */
function take(step) {
	const missing = (step.needs ?? []).filter((name) => hasFailed(name));
	return missing.length > 0
		? time(step.name, async () => oneCheck(false), `not run, because ${missing.join(' and ')} failed`)
		: time(step.name, step.run);
}

/**
 * Runs a step and notes what came of it and how long it took.
 * @param {string} name
 * @param {() => Promise<Counts>} run
 * @param {string} [note]
 */
async function time(name, run, note = '') {
	console.log(`\n--- ${name}${note ? `: ${note}` : ''}`);
	const startedAt = Date.now();
	const counts = await run();
	const result = { name, counts, ms: Date.now() - startedAt, note };
	results.push(result);
	return result;
}

/** @param {string} name */
function hasFailed(name) {
	return results.some((result) => result.name === name && result.counts.failed > 0);
}
