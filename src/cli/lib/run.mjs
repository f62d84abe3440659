import { spawn } from 'node:child_process';
import { ROOT } from './paths.mjs';

/**
 * @typedef {import('node:child_process').ChildProcess} ChildProcess
 *
 * @typedef {object} Ran
 * @property {number} code the exit code; 1 for a program that a signal ended or that could not be started
 * @property {number} ms how long it ran
 * @property {string} output what it printed, when it was kept, else empty
 *
 * @typedef {'show' | 'keep' | 'hold'} Output `show` passes on what a program prints, `keep` passes it on and keeps it,
 * `hold` keeps it and shows it only when the program fails
 */

const FORCE_AFTER_MS = 5_000;

/** The codes that a shell gives to programs ended by these signals. The keyboard's interrupt needs no passing on. */
const PASSED_ON = /** @type {const} */ ({ SIGHUP: 129, SIGTERM: 143 });

/**
 * Runs a program to its end in the project's folder. Told to end meanwhile, we end the program first.
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: NodeJS.ProcessEnv, limitMs?: number, output?: Output }} [options] `limitMs` ends a program that hangs
 * @returns {Promise<Ran>}
 */
export async function run(command, args, { env = process.env, limitMs = 0, output = 'show' } = {}) {
	const startedAt = Date.now();
	const out = output === 'show' ? 'inherit' : 'pipe';
	const child = spawn(command, args, { cwd: ROOT, env, stdio: ['ignore', out, out] });
	const printed = keep(child, output === 'keep');
	const release = passSignalsOn(child);
	const timer = limitMs > 0 ? setTimeout(() => stop(child, command, limitMs), limitMs) : undefined;
	const code = await codeOf(child, command);
	clearTimeout(timer);
	release();
	if (output === 'hold' && code !== 0) {
		console.error(printed());
	}
	return { code, ms: Date.now() - startedAt, output: printed() };
}

/**
 * @param {ChildProcess} child
 * @param {boolean} show whether what it prints is passed on, too
 */
function keep(child, show) {
	let printed = '';
	for (const stream of [child.stdout, child.stderr]) {
		stream?.setEncoding('utf8').on('data', (/** @type {string} */ text) => {
			printed += text;
			if (show) {
				process.stdout.write(text);
			}
		});
	}
	return () => printed;
}

/**
 * @param {ChildProcess} child
 * @returns {() => void} lets go of the signals again
 */
function passSignalsOn(child) {
	const pass = (/** @type {'SIGHUP' | 'SIGTERM'} */ signal) => {
		child.once('close', () => process.exit(PASSED_ON[signal]));
		child.kill(signal);
	};
	process.on('SIGHUP', pass).on('SIGTERM', pass);
	return () => process.off('SIGHUP', pass).off('SIGTERM', pass);
}

/**
 * @param {ChildProcess} child
 * @param {string} command
 * @returns {Promise<number>}
 */
function codeOf(child, command) {
	return new Promise((resolve) => {
		child.once('error', (error) => {
			console.error(`${command} could not be started: ${error.message}`);
			resolve(1);
		});
		child.once('close', (code) => resolve(code ?? 1));
	});
}

/**
 * @param {ChildProcess} child
 * @param {string} command
 * @param {number} limitMs
 */
function stop(child, command, limitMs) {
	console.error(`${command} took longer than ${limitMs / 1000} seconds and was ended.`);
	child.kill('SIGTERM');
	setTimeout(() => child.kill('SIGKILL'), FORCE_AFTER_MS).unref();
}
