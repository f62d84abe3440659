import { existsSync } from 'node:fs';
import { at } from './paths.mjs';

/**
 * @typedef {object} Settings
 * @property {number} port
 * @property {string} host
 * @property {string} publicUrl without a slash at the end
 * @property {number} smsPort
 * @property {number} mailPort
 * @property {number} smtpPort
 * @property {NodeJS.ProcessEnv} env the environment with all of these filled in
 */

/** Takes a `.env` file in, when there is one; what the environment says already goes first. */
export function loadDotEnv() {
	if (existsSync(at('.env'))) {
		process.loadEnvFile(at('.env'));
	}
}

/**
 * Fills in what an environment leaves open. In demonstration mode the server listens on loopback only.
 * @param {NodeJS.ProcessEnv} given
 * @param {{ demo: boolean }} options
 * @returns {Settings}
 * @throws {Error} naming the variable, when a port is none
 */
export function settingsOf(given, { demo }) {
	const port = portOf(given, 'PORT', 3000);
	const smsPort = portOf(given, 'FAKE_SMS_PORT', 3001);
	const mailPort = portOf(given, 'FAKE_MAIL_PORT', 3002);
	const smtpPort = portOf(given, 'FAKE_SMTP_PORT', 3003);
	const host = given.HOST || (demo ? '127.0.0.1' : '0.0.0.0');
	const publicUrl = (given.PUBLIC_URL || `http://127.0.0.1:${port}`).replace(/\/+$/, '');
	const env = {
		...given,
		PORT: String(port),
		HOST: host,
		PUBLIC_URL: publicUrl,
		// Without it the framework takes every request for https and refuses forms sent over http.
		ORIGIN: publicUrl,
		DATA_DIR: given.DATA_DIR || './data',
		SHUTDOWN_TIMEOUT: given.SHUTDOWN_TIMEOUT || '5',
		...(demo
			? {
					DEMO: '1',
					FAKE_SMS_PORT: String(smsPort),
					FAKE_MAIL_PORT: String(mailPort),
					FAKE_SMTP_PORT: String(smtpPort)
				}
			: {})
	};
	return { port, host, publicUrl, smsPort, mailPort, smtpPort, env };
}

/** @param {NodeJS.ProcessEnv} env */
export function isDemo(env) {
	return env.DEMO === '1' || env.DEMO === 'true';
}

/**
 * @param {NodeJS.ProcessEnv} env
 * @param {string} name
 * @param {number} fallback
 */
function portOf(env, name, fallback) {
	const text = env[name];
	if (!text) {
		return fallback;
	}
	const port = Number(text);
	if (!Number.isInteger(port) || port < 1 || port > 65_535) {
		throw new Error(`${name} is '${text}': it must be a whole number from 1 to 65535.`);
	}
	return port;
}
