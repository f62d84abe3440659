import { end } from './children.mjs';

/**
 * @typedef {import('node:child_process').ChildProcess} ChildProcess
 *
 * @typedef {object} Family
 * @property {() => boolean} isStopping
 * @property {(code: number, message?: string) => Promise<void>} stop ends all of it, and this process with the code
 */

const LOOK_EVERY_MS = 300;

/** Who started us, noted before installing and building, during which it may be gone already. */
const PARENT = process.ppid;

const SIGNALS = /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']);

/**
 * What one launcher has started, which ends with it: at an interrupt or a request to end, with code 0. The server
 * goes first, because it may still have something to send. A second interrupt changes nothing.
 * @param {ChildProcess} server
 * @param {ChildProcess[]} fakes
 * @returns {Family}
 */
export function createFamily(server, fakes) {
	let stopping = false;
	const stop = async (/** @type {number} */ code, message = '') => {
		if (stopping) {
			return;
		}
		stopping = true;
		if (message) {
			console.error(message);
		}
		await end(server);
		await Promise.all(fakes.map(end));
		process.exit(code);
	};
	SIGNALS.forEach((signal) => process.on(signal, () => void stop(0)));
	watchNpm(() => void stop(0));
	return { isStopping: () => stopping, stop };
}

/**
 * npm started us, and when it is killed nobody tells us: we only get another parent. Started without npm there is
 * nothing to watch; who starts us in the background may go.
 * @param {() => void} gone
 */
function watchNpm(gone) {
	if (process.env.npm_lifecycle_event) {
		setInterval(() => (process.ppid === PARENT ? undefined : gone()), LOOK_EVERY_MS).unref();
	}
}
