import { spawn } from 'node:child_process';
import { at, ROOT } from './paths.mjs';

/** @typedef {import('node:child_process').ChildProcess} ChildProcess */

const FORCE_AFTER_MS = 10_000;

/**
 * Starts Node on a file, with a channel between us that closes when we are gone, so that the child can end too.
 * @param {string[]} args
 * @param {NodeJS.ProcessEnv} env
 * @param {'inherit' | 'pipe'} output where the child's output goes
 * @returns {ChildProcess}
 */
function spawnNode(args, env, output) {
	return spawn(process.execPath, args, { cwd: ROOT, env, stdio: ['ignore', output, output, 'ipc'] });
}

/**
 * Starts one of the stand-ins.
 * @param {'sms' | 'mail'} name
 * @param {NodeJS.ProcessEnv} env
 * @param {'inherit' | 'pipe'} [output]
 */
export function spawnFake(name, env, output = 'inherit') {
	return spawnNode(['--import', 'tsx', at('src', 'fakes', `${name}.ts`)], env, output);
}

/**
 * Starts a server that ends in its orderly way when we are gone.
 * @param {string[]} args the file, and what it is given
 * @param {NodeJS.ProcessEnv} env
 * @param {'inherit' | 'pipe'} [output]
 */
export function spawnFollower(args, env, output = 'inherit') {
	const follow = new URL('./follow.mjs', import.meta.url).href;
	return spawnNode(['--import', follow, ...args], env, output);
}

/**
 * Starts the built application.
 * @param {NodeJS.ProcessEnv} env
 * @param {'inherit' | 'pipe'} [output]
 */
export function spawnServer(env, output = 'inherit') {
	return spawnFollower([at('build', 'index.js')], { ...env, NODE_ENV: 'production' }, output);
}

/** @param {ChildProcess} child */
export function isRunning(child) {
	return child.exitCode === null && child.signalCode === null && child.pid !== undefined;
}

/**
 * Waits until a child has ended.
 * @param {ChildProcess} child
 * @returns {Promise<void>}
 */
export async function ended(child) {
	if (isRunning(child)) {
		await new Promise((resolve) => child.once('exit', resolve));
	}
}

/**
 * Ends a child in its orderly way, and after ten seconds in any way.
 * @param {ChildProcess} child
 */
export async function end(child) {
	const timer = setTimeout(() => child.kill('SIGKILL'), FORCE_AFTER_MS);
	child.kill('SIGTERM');
	await ended(child);
	clearTimeout(timer);
}
