import type { ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { end, ended, isRunning, spawnFake, spawnServer } from '../../src/cli/lib/children.mjs';
import { freePorts } from '../../src/cli/lib/ports.mjs';
import { waitUntilReady } from '../../src/cli/lib/ready.mjs';
import { settingsOf, type Settings } from '../../src/cli/lib/settings.mjs';

/** The built application in demonstration mode, with the stand-ins for SMS and mail beside it. */
export interface Product {
	/** Where the application is, without a slash at the end. */
	url: string;
	/** The SMS fake: `/phones`, `/faults`, and the page of phones and mailbox. */
	smsUrl: string;
	/** The HTTP side of the mail fake: `/mails`, `/faults`. */
	mailUrl: string;
	dataDir: string;
	/** Everything the application and the fakes have printed, line by line, in the order of arrival. */
	logs: string[];
	/** Kills the server alone, SIGKILL unless told otherwise, and waits until it is gone. The fakes go on. */
	kill(signal?: NodeJS.Signals): Promise<void>;
	/** Starts the server again on the same data and ports, and waits until it is ready. Kills it first if it runs. */
	restart(): Promise<void>;
	/** Moves the server's clock forward by milliseconds; all work due by then is done when it resolves. */
	advance(ms: number): Promise<void>;
	/** Moves the server's clock forward to an instant. */
	advanceTo(instant: number): Promise<void>;
	/** Ends server and fakes, and removes the data if they were made for this product. */
	stop(): Promise<void>;
}

export interface ProductOptions {
	/** More environment, for example `RATE_LIMIT_SCALE`. */
	env?: Record<string, string>;
	/** A folder to keep; without it a fresh one is made and removed at the end. */
	dataDir?: string;
	/** How long the server may take to be ready, milliseconds. */
	readyLimitMs?: number;
}

/** The first start makes the demonstration hospital; a restart has to be much quicker, and is measured elsewhere. */
const READY_LIMIT_MS = 120_000;

/** Variables of a person's own server, which a test must not touch. */
const LEFT_OUT = ['ADDRESS_HEADER', 'DATABASE_URL', 'DATA_DIR', 'HOST', 'ORIGIN', 'PORT', 'PUBLIC_URL'];

/**
 * Starts a product of its own on free ports, with `DEMO=1` and `TEST_CLOCK=1`. Should the test process be killed,
 * everything started here ends by itself.
 * @throws Error with the last lines of the log, when it does not get ready
 */
export async function startProduct(options: ProductOptions = {}): Promise<Product> {
	const dataDir = options.dataDir ?? mkdtempSync(path.join(tmpdir(), 'ropewalk-'));
	const settings = await settingsFor(dataDir, options.env ?? {});
	const limitMs = options.readyLimitMs ?? READY_LIMIT_MS;
	const logs: string[] = [];
	const sms = listenTo(spawnFake('sms', settings.env, 'pipe'), logs);
	const mail = listenTo(spawnFake('mail', settings.env, 'pipe'), logs);
	const url = settings.publicUrl;
	const smsUrl = `http://127.0.0.1:${settings.smsPort}`;
	const mailUrl = `http://127.0.0.1:${settings.mailPort}`;
	let server: ChildProcess | null = null;

	const kill = async (signal: NodeJS.Signals = 'SIGKILL') => {
		if (server && isRunning(server)) {
			server.kill(signal);
			await ended(server);
		}
	};
	const stop = async () => {
		await (server ? end(server) : null);
		await Promise.all([end(sms), end(mail)]);
		if (!options.dataDir) {
			rmSync(dataDir, { recursive: true, force: true });
		}
	};
	const restart = async () => {
		await kill();
		server = listenTo(spawnServer(settings.env, 'pipe'), logs);
		await ready(`${url}/readyz`, server, limitMs, logs);
	};

	try {
		await Promise.all([
			ready(`${smsUrl}/healthz`, sms, limitMs, logs),
			ready(`${mailUrl}/healthz`, mail, limitMs, logs),
			restart()
		]);
	} catch (error) {
		await stop();
		throw error;
	}
	return {
		url,
		smsUrl,
		mailUrl,
		dataDir,
		logs,
		kill,
		restart,
		stop,
		advance: async (ms) => {
			await advanceClock(url, ms);
		},
		advanceTo: async (instant) => {
			await advanceClock(url, instant - (await advanceClock(url, 0)));
		}
	};
}

async function settingsFor(dataDir: string, env: Record<string, string>): Promise<Settings> {
	const [port, smsPort, mailPort, smtpPort] = await freePorts(4);
	const inherited = Object.entries(process.env).filter(([name]) => !LEFT_OUT.includes(name));
	const given = {
		...Object.fromEntries(inherited),
		PORT: String(port),
		FAKE_SMS_PORT: String(smsPort),
		FAKE_MAIL_PORT: String(mailPort),
		FAKE_SMTP_PORT: String(smtpPort),
		DATA_DIR: dataDir,
		TEST_CLOCK: '1',
		...env
	};
	return settingsOf(given, { demo: true });
}

async function ready(url: string, child: ChildProcess, limitMs: number, logs: string[]): Promise<void> {
	const why = await waitUntilReady(url, child, limitMs);
	if (why !== null) {
		throw new Error(`${url} is not ready: ${why}\n${logs.slice(-40).join('\n')}`);
	}
}

function listenTo(child: ChildProcess, logs: string[]): ChildProcess {
	for (const stream of [child.stdout, child.stderr]) {
		let rest = '';
		stream?.setEncoding('utf8').on('data', (text: string) => {
			const lines = (rest + text).split('\n');
			rest = lines.pop() ?? '';
			logs.push(...lines);
		});
	}
	return child;
}

/** Answers with the instant it is then. */
async function advanceClock(url: string, ms: number): Promise<number> {
	const response = await fetch(`${url}/api/demo/clock`, {
		method: 'PUT',
		headers: { 'Content-Type': 'application/json' },
		body: JSON.stringify({ advanceMs: ms })
	});
	if (!response.ok) {
		throw new Error(`The clock was not moved by ${ms} ms: ${response.status} ${await response.text()}`);
	}
	const { now } = (await response.json()) as { now: string };
	return Date.parse(now);
}
