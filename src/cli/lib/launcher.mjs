import { ended, isRunning, spawnFake } from './children.mjs';
import { createFamily } from './family.mjs';
import { takenPort } from './ports.mjs';
import { fakeListens, waitUntilReady } from './ready.mjs';

/**
 * @typedef {import('node:child_process').ChildProcess} ChildProcess
 * @typedef {import('./settings.mjs').Settings} Settings
 *
 * @typedef {object} Plan
 * @property {Settings} settings
 * @property {boolean} demo whether the stand-ins belong to it
 * @property {boolean} reuse whether stand-ins that listen already are used, else their ports count as taken
 * @property {(env: NodeJS.ProcessEnv) => ChildProcess} spawn starts the server
 * @property {(settings: Settings) => void} onReady
 */

/** The first start makes a whole hospital before it is ready. */
const READY_LIMIT_MS = 180_000;

/**
 * Runs the server, and in demonstration mode the stand-ins beside it, until this process is told to end. A server
 * that dies before it is ready ends everything with code 1; one that dies later leaves the stand-ins running with
 * their messages, so that it can be started again by hand.
 * @param {Plan} plan
 */
export async function launch({ settings, demo, reuse, spawn, onReady }) {
	const names = demo ? await fakesToStart(settings, reuse) : [];
	const taken = await takenPort(
		[['PORT', settings.port], ...names.flatMap(portsOf(settings))],
		settings.host
	);
	if (taken) {
		console.error(taken);
		process.exitCode = 1;
		return;
	}
	const fakes = names.map((name) => spawnFake(name, settings.env));
	const server = spawn(settings.env);
	const family = createFamily(server, fakes);
	const why = await firstReason([
		whyNotReady('The server', settings.port, '/readyz', server),
		...names.map((name, index) => whyNotReady(...fakeOf(settings, name), fakes[index] ?? server))
	]);
	if (why !== null) {
		return family.stop(1, why);
	}
	onReady(settings);
	await ended(server);
	if (!fakes.some(isRunning)) {
		return family.stop(server.exitCode ?? 1);
	}
	if (!family.isStopping()) {
		tellServerEnded(server, settings);
	}
}

/**
 * Waits for one process, and rejects with a sentence when it does not get ready.
 * @param {string} what
 * @param {number} port
 * @param {string} path
 * @param {ChildProcess} child
 */
async function whyNotReady(what, port, path, child) {
	const why = await waitUntilReady(`http://127.0.0.1:${port}${path}`, child, READY_LIMIT_MS);
	if (why !== null) {
		throw new Error(`${what} did not get ready: ${why}.`);
	}
}

/**
 * The first reason for not being ready, as soon as there is one; null when all are ready.
 * @param {Promise<void>[]} all
 * @returns {Promise<string | null>}
 */
function firstReason(all) {
	return Promise.all(all).then(
		() => null,
		(/** @type {Error} */ error) => error.message
	);
}

/**
 * @param {Settings} settings
 * @param {'sms' | 'mail'} name
 * @returns {[what: string, port: number, path: string]}
 */
function fakeOf({ smsPort, mailPort }, name) {
	return name === 'sms'
		? ['The stand-in for the SMS gateway', smsPort, '/healthz']
		: ['The stand-in for the mail server', mailPort, '/healthz'];
}

/**
 * @param {Settings} settings
 * @param {boolean} reuse
 * @returns {Promise<('sms' | 'mail')[]>}
 */
async function fakesToStart(settings, reuse) {
	if (!reuse) {
		return ['sms', 'mail'];
	}
	const [sms, mail] = await Promise.all([
		fakeListens('sms', settings.smsPort),
		fakeListens('mail', settings.mailPort)
	]);
	/** @type {('sms' | 'mail')[]} */
	const none = [];
	return none.concat(sms ? [] : ['sms'], mail ? [] : ['mail']);
}

/**
 * @param {Settings} settings
 * @returns {(name: 'sms' | 'mail') => [variable: string, port: number][]}
 */
function portsOf({ smsPort, mailPort, smtpPort }) {
	return (name) =>
		name === 'sms'
			? [['FAKE_SMS_PORT', smsPort]]
			: [
					['FAKE_MAIL_PORT', mailPort],
					['FAKE_SMTP_PORT', smtpPort]
				];
}

const RESTART_WITH = [
	'PORT',
	'HOST',
	'PUBLIC_URL',
	'DATA_DIR',
	'FAKE_SMS_PORT',
	'FAKE_MAIL_PORT',
	'FAKE_SMTP_PORT',
	'TEST_CLOCK',
	'TEST_CLOCK_AT'
];

/**
 * @param {ChildProcess} server
 * @param {Settings} settings
 */
function tellServerEnded(server, { env }) {
	const how = server.signalCode ?? `code ${server.exitCode}`;
	const words = RESTART_WITH.flatMap((name) => (env[name] ? [`${name}=${env[name]}`] : []));
	console.log(`\nThe server has ended (${how}). Phones and mailbox keep running with their messages.`);
	console.log(`Start it again with: DEMO=1 ${words.join(' ')} npm start`);
}
