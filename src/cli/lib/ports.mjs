import { createServer } from 'node:net';

/**
 * Whether a server could listen there now.
 * @param {number} port
 * @param {string} [host]
 * @returns {Promise<boolean>}
 */
export function isFree(port, host = '127.0.0.1') {
	return new Promise((resolve) => {
		const probe = createServer();
		probe.once('error', () => resolve(false));
		probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
	});
}

/**
 * The first taken one of several ports, as a sentence that says what to do about it.
 * @param {[variable: string, port: number][]} wanted
 * @param {string} host
 * @returns {Promise<string | null>} null when all are free
 */
export async function takenPort(wanted, host) {
	for (const [variable, port] of wanted) {
		if (!(await isFree(port, variable === 'PORT' ? host : '127.0.0.1'))) {
			return `Port ${port} is taken. Choose another one with ${variable}, for example ${variable}=${port + 100}.`;
		}
	}
	return null;
}

const LOWEST = 20_000;
const HIGHEST = 32_000;

/**
 * Ports that are free on loopback. They lie below the range that the system gives to outgoing connections, so that a
 * server can be started again on its own port.
 * @param {number} count
 * @returns {Promise<number[]>}
 */
export async function freePorts(count) {
	/** @type {Set<number>} */
	const found = new Set();
	while (found.size < count) {
		const port = LOWEST + Math.floor(Math.random() * (HIGHEST - LOWEST));
		if (!found.has(port) && (await isFree(port))) {
			found.add(port);
		}
	}
	return [...found];
}
