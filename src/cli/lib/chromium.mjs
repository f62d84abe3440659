import { existsSync } from 'node:fs';
import { run } from './run.mjs';

/** Where Debian installs the browser; `CHROMIUM_PATH` names another one. */
export const CHROMIUM = process.env.CHROMIUM_PATH || '/usr/bin/chromium';
/** The same browser without the windows that nobody sees, which starts and draws a fifth faster. */
const SHELL = process.env.CHROMIUM_PATH || '/usr/bin/chromium-headless-shell';

/** The browser for looking at pages one by one; where Debian has no shell, the whole one. */
export function shellOrChromium() {
	return existsSync(SHELL) ? SHELL : CHROMIUM;
}

/** With the face that stands in until ours has come, so that every machine measures by the same letters. */
const COMMANDS = [
	['apt-get', 'update'],
	[
		'apt-get',
		'install',
		'-y',
		'--no-install-recommends',
		'chromium',
		'chromium-headless-shell',
		'fonts-liberation'
	]
];

/**
 * Installs the browser for the journeys when it is missing and we may; else says how.
 * @returns {Promise<boolean>} whether it is there
 */
export async function ensureChromium() {
	if (existsSync(CHROMIUM) && existsSync(SHELL)) {
		return true;
	}
	if (process.getuid?.() === 0 && existsSync('/usr/bin/apt-get')) {
		await installChromium();
	}
	if (existsSync(CHROMIUM)) {
		return true;
	}
	const line = COMMANDS.map((words) => `sudo ${words.join(' ')}`).join(' && ');
	console.error(`The journeys need Chromium at ${CHROMIUM}. Install it with:\n  ${line}`);
	console.error('or name another one in CHROMIUM_PATH.');
	return false;
}

async function installChromium() {
	console.log('Installing Chromium ...');
	const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
	for (const [command = '', ...args] of COMMANDS) {
		const { code } = await run(command, args, { env });
		if (code !== 0) {
			return;
		}
	}
}
