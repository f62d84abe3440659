import { spawn, type ChildProcess } from 'node:child_process';
import { createServer, type Server } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { ended } from '../../src/cli/lib/children.mjs';
import { freePorts, isFree } from '../../src/cli/lib/ports.mjs';

/** Launching and ending, with the real fakes and a stand-in for the application. */

const MAIN = fileURLToPath(new URL('../support/launcher/main.mjs', import.meta.url));

/** Enough for two processes to start on a busy machine. */
const PATIENCE_MS = 30_000;

interface Launched {
	process: ChildProcess;
	/** Resolves when this text has been printed. */
	said(text: string): Promise<void>;
	output(): string;
}

let ports: number[] = [];
let launched: Launched[] = [];

beforeEach(async () => {
	ports = await freePorts(4);
	launched = [];
});

afterEach(async () => {
	for (const { process } of launched) {
		process.kill('SIGKILL');
		await ended(process);
	}
	await allFree();
});

function launch(more: Record<string, string> = {}): Launched {
	const [port, sms, mail, smtp] = ports.map(String);
	const env = {
		...process.env,
		...{ PORT: port, FAKE_SMS_PORT: sms, FAKE_MAIL_PORT: mail, FAKE_SMTP_PORT: smtp },
		...more
	};
	const child = spawn(process.execPath, [MAIN], { env, stdio: ['ignore', 'pipe', 'pipe'] });
	let text = '';
	const listeners = new Set<() => void>();
	for (const stream of [child.stdout, child.stderr]) {
		stream.setEncoding('utf8').on('data', (part: string) => {
			text += part;
			listeners.forEach((listen) => listen());
		});
	}
	const said = (wanted: string) =>
		new Promise<void>((resolve, reject) => {
			const check = () => (text.includes(wanted) ? resolve() : undefined);
			listeners.add(check);
			child.once('close', () => reject(new Error(`It ended without saying '${wanted}':\n${text}`)));
			check();
		});
	const one = { process: child, said, output: () => text };
	launched.push(one);
	return one;
}

async function allFree(): Promise<void> {
	const until = Date.now() + PATIENCE_MS;
	while (!(await Promise.all(ports.map((port) => isFree(port)))).every(Boolean)) {
		if (Date.now() > until) {
			throw new Error(`Something still listens on one of ${ports.join(', ')}.`);
		}
		await delay(20);
	}
}

const pidOfServer = async () => Number(await (await fetch(`http://127.0.0.1:${ports[0]}/pid`)).text());

describe('a launcher', () => {
	it.each(['SIGTERM', 'SIGINT', 'SIGHUP'] as const)('ends everything at %s, with code 0', async (signal) => {
		const { process, said } = launch();
		await said('all is ready');
		process.kill(signal);
		await ended(process);
		expect([process.exitCode, process.signalCode]).toEqual([0, null]);
		await expect(allFree()).resolves.toBeUndefined();
	});

	it('leaves nothing behind when it is killed', async () => {
		const { process, said } = launch();
		await said('all is ready');
		process.kill('SIGKILL');
		await expect(allFree()).resolves.toBeUndefined();
	});

	it('keeps the fakes when the server is killed, which can be started again beside them', async () => {
		const first = launch();
		await first.said('all is ready');
		const number = '+353860000101';
		await fetch(`http://127.0.0.1:${ports[1]}/phones`, {
			method: 'PUT',
			body: JSON.stringify({ items: [{ number, owner: 'R. Ferris' }] })
		});
		process.kill(await pidOfServer(), 'SIGKILL');
		await first.said('Start it again with: DEMO=1 PORT=');
		const second = launch({ REUSE: '1' });
		await second.said('all is ready');
		const phones = await (await fetch(`http://127.0.0.1:${ports[1]}/phones`)).text();
		expect(phones).toContain('R. Ferris');
		second.process.kill('SIGTERM');
		await ended(second.process);
		expect((await fetch(`http://127.0.0.1:${ports[1]}/healthz`)).status).toBe(200);
	});

	it('ends with the server when it has started nothing else', async () => {
		const first = launch();
		await first.said('all is ready');
		process.kill(await pidOfServer(), 'SIGKILL');
		await first.said('Start it again with');
		const second = launch({ REUSE: '1' });
		await second.said('all is ready');
		process.kill(await pidOfServer(), 'SIGKILL');
		await ended(second.process);
		expect(second.process.exitCode).toBe(1);
	});

	it('gives up with the fakes when the server does not get ready', async () => {
		const { process, output } = launch({ STAND_IN_FAILS: '1' });
		await ended(process);
		expect(process.exitCode).toBe(1);
		expect(output()).toContain('The server did not get ready: it ended (code 3).');
		await expect(allFree()).resolves.toBeUndefined();
	});
});

describe('a taken port', () => {
	let holder: Server;
	afterEach(() => new Promise((resolve) => holder.close(resolve)));

	it.each([
		['PORT', 0],
		['FAKE_SMS_PORT', 1],
		['FAKE_MAIL_PORT', 2],
		['FAKE_SMTP_PORT', 3]
	])('is named with its variable: %s', async (variable, index) => {
		const port = ports[index] ?? 0;
		holder = createServer();
		await new Promise<void>((resolve) => holder.listen(port, '127.0.0.1', resolve));
		ports = ports.filter((other) => other !== port);
		const names = ['PORT', 'FAKE_SMS_PORT', 'FAKE_MAIL_PORT', 'FAKE_SMTP_PORT'];
		const others = names.filter((name) => name !== variable);
		const env = Object.fromEntries(others.map((name, place) => [name, String(ports[place])]));
		const { process, output } = launch({ ...env, [variable]: String(port) });
		await ended(process);
		expect(process.exitCode).toBe(1);
		expect(output().trim()).toBe(
			`Port ${port} is taken. Choose another one with ${variable}, for example ${variable}=${port + 100}.`
		);
	});
});
