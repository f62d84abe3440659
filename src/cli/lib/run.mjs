import { spawn } from 'node:child_process';
import { ROOT } from './paths.mjs';

/**
 * @typedef {object} Ran
 * @property {number} code the exit code; 1 for a program that a signal ended or that could not be started
 * @property {number} ms how long it ran
 * @property {string} output what it printed, when that was asked for, else empty
 */

const FORCE_AFTER_MS = 5_000;

/** Told to end, a command ends what it runs first; the keyboard's interrupt reaches both by itself. */
const SIGNALS = /** @type {const} */ (['SIGTERM', 'SIGHUP']);

/**
 * Runs a program to its end in the project's folder, with its output on our own.
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: NodeJS.ProcessEnv, limitMs?: number, capture?: boolean }} [options] `limitMs` ends a program that
 * hangs; `capture` also keeps what it prints
 * @returns {Promise<Ran>}
 */
export function run(command, args, { env = process.env, limitMs = 0, capture = false } = {}) {
	const startedAt = Date.now();
	return new Promise((resolve) => {
		const out = capture ? 'pipe' : 'inherit';
		const child = spawn(command, args, { cwd: ROOT, env, stdio: ['ignore', out, 'inherit'] });
		let output = '';
		child.stdout?.on('data', (/** @type {Buffer} */ chunk) => {
			output += chunk;
			process.stdout.write(chunk);
		});
		const timer = limitMs > 0 ? setTimeout(() => stop(child, command, limitMs), limitMs) : undefined;
		const forward = (/** @type {NodeJS.Signals} */ signal) => {
			child.kill(signal);
			process.exitCode = 1;
		};
		SIGNALS.forEach((signal) => process.on(signal, forward));
		const done = (/** @type {number} */ code) => {
			clearTimeout(timer);
			SIGNALS.forEach((signal) => process.off(signal, forward));
			resolve({ code, ms: Date.now() - startedAt, output });
		};
		child.once('error', (error) => {
			console.error(`${command} could not be started: ${error.message}`);
			done(1);
		});
		child.once('close', (code) => done(code ?? 1));
	});
}

/**
 * @param {import('node:child_process').ChildProcess} child
 * @param {string} command
 * @param {number} limitMs
 */
function stop(child, command, limitMs) {
	console.error(`${command} took longer than ${limitMs / 1000} seconds and was ended.`);
	child.kill('SIGTERM');
	setTimeout(() => child.kill('SIGKILL'), FORCE_AFTER_MS).unref();
}
