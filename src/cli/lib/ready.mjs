import { setTimeout as delay } from 'node:timers/promises';
import { isRunning } from './children.mjs';

const PAUSE_MS = 100;
const ANSWER_LIMIT_MS = 5_000;

/**
 * Asks an address until it answers 200.
 * @param {string} url
 * @param {import('node:child_process').ChildProcess} child the process that should answer
 * @param {number} limitMs how long to wait
 * @returns {Promise<string | null>} null when it is ready, else why it is not
 */
export async function waitUntilReady(url, child, limitMs) {
	const until = Date.now() + limitMs;
	let last = 'no answer yet';
	while (Date.now() < until) {
		if (!isRunning(child)) {
			return `it ended (${child.signalCode ?? `code ${child.exitCode}`})`;
		}
		const answer = await ask(url);
		if (answer === null) {
			return null;
		}
		last = answer;
		await delay(PAUSE_MS);
	}
	return `not ready after ${Math.round(limitMs / 1000)} seconds, ${url}: ${last}`;
}

/**
 * @param {string} url
 * @returns {Promise<string | null>}
 */
async function ask(url) {
	try {
		const response = await fetch(url, { signal: AbortSignal.timeout(ANSWER_LIMIT_MS), redirect: 'manual' });
		const text = (await response.text()).slice(0, 300);
		return response.status === 200 ? null : `${response.status} ${text}`;
	} catch (error) {
		return error instanceof Error ? error.message : String(error);
	}
}

/**
 * Whether one of the stand-ins answers on this port.
 * @param {'sms' | 'mail'} name
 * @param {number} port
 * @returns {Promise<boolean>}
 */
export async function fakeListens(name, port) {
	try {
		const signal = AbortSignal.timeout(ANSWER_LIMIT_MS);
		const response = await fetch(`http://127.0.0.1:${port}/healthz`, { signal });
		/** @type {{ fake?: string }} */
		const body = await response.json();
		return body.fake === name;
	} catch {
		return false;
	}
}
