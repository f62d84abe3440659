import { createServer as createSocketServer, type AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';
import { beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import type { Outgoing } from '$lib/server/outbox/channels/channel';
import { openChannels } from '$lib/server/outbox/channels';
import { mailChannel } from '$lib/server/outbox/channels/mail';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { HOSPITAL_NOW, addPerson } from '../support/hospital';
import { addReminder, addVisit, attemptsOf, rowOf } from '../support/messages';
import { openGateway } from '../support/open-gateway';

const { gateway, hospital } = await openGateway();

const channel = () => {
	const { mail } = openChannels(env());
	if (!mail) {
		throw new Error('The demonstration has a mail server.');
	}
	return mail;
};

const newest = async () => (await gateway.mails()).at(-1);

function message(change: Partial<Outgoing> = {}): Outgoing {
	return {
		id: '0198-row',
		to: 'surgeon@saltmarsh.example',
		name: 'Ó Néill, Aoife',
		subject: 'Ropewalk: something to read',
		body: 'Sign in to read it:\n\nhttp://127.0.0.1:4301/patients/1/visits\n',
		...change
	};
}

describe('a mail over SMTP', () => {
	beforeEach(() => gateway.fault('mail', 'ok'));

	it('arrives with subject, text and simple HTML, and is known by its row', async () => {
		expect(await channel().send(message())).toEqual({
			outcome: { kind: 'accepted', id: '<0198-row@127.0.0.1>' },
			code: null
		});
		expect(await newest()).toMatchObject({
			to: 'surgeon@saltmarsh.example',
			from: 'ropewalk@saltmarsh.example',
			subject: 'Ropewalk: something to read',
			text: message().body,
			html: expect.stringContaining('<a href="http://127.0.0.1:4301/patients/1/visits">')
		});
	});

	it.each([
		['a second receiver in the address', { to: 'ok@y.test\r\nBcc: evil@z.test' }],
		['two addresses', { to: 'ok@y.test, evil@z.test' }]
	])('S-45: is not sent with %s', async (_, change) => {
		const before = (await gateway.mails()).length;
		expect(await channel().send(message(change))).toEqual({
			outcome: { kind: 'permanent', reason: 'bad-address' },
			code: 'not-an-address'
		});
		expect(await gateway.mails()).toHaveLength(before);
	});

	it.each([
		['the name', { name: 'Aoife\r\nBcc: evil@z.test' }],
		['the subject', { subject: 'Read\r\nBcc: evil@z.test' }]
	])('S-45: gets no second receiver through %s', async (_, change) => {
		await channel().send(message(change));
		expect((await newest())?.to).toBe('surgeon@saltmarsh.example');
	});

	it.each([
		['greylist', { kind: 'transient', reason: 'try-later', retryAfter: null }, '451'],
		['reject', { kind: 'permanent', reason: 'bad-address' }, '550']
	])('F18, F19: %s', async (mode, outcome, code) => {
		await gateway.fault('mail', mode, 1);
		expect(await channel().send(message())).toEqual({ outcome, code });
	});

	it('cut off after the text, nobody knows', async () => {
		await gateway.fault('mail', 'drop', 1);
		expect((await channel().send(message())).outcome).toEqual({ kind: 'unknown', reason: 'no-answer' });
	});

	it('nobody listens', async () => {
		const gone = mailChannel(
			{ url: 'smtp://127.0.0.1:4398', from: 'a@b.example', requireTls: false },
			env().publicUrl
		);
		expect((await gone.send(message())).outcome).toMatchObject({ kind: 'transient', reason: 'not-reached' });
	});

	it('in production nothing is sent to a server that does not encrypt', async () => {
		const open = mailChannel(
			{ url: `smtp://127.0.0.1:${gateway.smtpPort}`, from: 'a@b.example', requireTls: true },
			env().publicUrl
		);
		const before = (await gateway.mails()).length;
		expect((await open.send(message())).outcome).toMatchObject({
			kind: 'transient',
			reason: 'no-encryption'
		});
		expect(await gateway.mails()).toHaveLength(before);
	});
});

describe('headers', () => {
	it('keep one Message-ID over all attempts of a row', async () => {
		const ids: string[] = [];
		const server = new SMTPServer({
			authOptional: true,
			disabledCommands: ['STARTTLS'],
			onData: (stream, _session, done) => {
				let text = '';
				stream.on('data', (chunk: Buffer) => (text += chunk.toString()));
				stream.on('end', () => {
					ids.push(/^Message-ID: (.*)$/im.exec(text)?.[1]?.trim() ?? '');
					expect(text).toMatch(/^Auto-Submitted: auto-generated/im);
					done();
				});
			}
		});
		await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
		const { port } = server.server.address() as AddressInfo;
		const there = mailChannel(
			{ url: `smtp://127.0.0.1:${port}`, from: 'a@b.example', requireTls: false },
			'https://ropewalk.example'
		);
		await there.send(message());
		await there.send(message());
		await there.send(message({ id: 'another' }));
		await new Promise<void>((resolve) => server.close(() => resolve()));
		expect(ids).toEqual([
			'<0198-row@ropewalk.example>',
			'<0198-row@ropewalk.example>',
			'<another@ropewalk.example>'
		]);
	});

	it('a server that never greets is given up', async () => {
		const silent = createSocketServer(() => {});
		await new Promise<void>((resolve) => silent.listen(0, '127.0.0.1', resolve));
		const { port } = silent.address() as AddressInfo;
		const there = mailChannel(
			{ url: `smtp://127.0.0.1:${port}`, from: 'a@b.example', requireTls: false },
			env().publicUrl,
			{ connectMs: 150, silenceMs: 150 }
		);
		expect((await there.send(message())).outcome.kind).not.toBe('accepted');
		silent.close();
	});
});

describe('the outbox over SMTP', () => {
	let now: number;

	beforeEach(async () => {
		await db().update(outbox).set({ state: 'cancelled' });
		await gateway.fault('mail', 'ok');
		now = HOSPITAL_NOW;
	});

	const worker = () =>
		new OutboxWorker({
			channels: { ...openChannels(env()), sms: null },
			now: () => now,
			random: () => 0.5
		});

	async function mailRow(userId = hospital.people.surgeon.id) {
		return addReminder(await addVisit(hospital), hospital.patient.id, {
			kind: 'mail',
			channel: 'mail',
			patientId: undefined,
			userId,
			subject: 'Ropewalk: something to read'
		});
	}

	it('a greylisted mail goes out later', async () => {
		const id = await mailRow();
		await gateway.fault('mail', 'greylist', 2);
		for (const state of ['ready', 'ready', 'accepted']) {
			await worker().settle();
			expect((await rowOf(id)).state).toBe(state);
			now = (await rowOf(id)).nextAt;
		}
		expect((await attemptsOf(id)).map(({ code }) => code)).toEqual(['451', '451', null]);
	});

	it('a refused one is a loose end', async () => {
		const stranger = await addPerson({ role: 'surgeon', unitIds: [] });
		const id = await mailRow(stranger.id);
		await gateway.fault('mail', 'reject', 1);
		await worker().settle();
		expect(await rowOf(id)).toMatchObject({ state: 'failed', stateReason: 'bad-address' });
	});

	it('one that was cut off is sent again', async () => {
		const id = await mailRow();
		await gateway.fault('mail', 'drop', 1);
		await worker().settle();
		now = (await rowOf(id)).nextAt;
		await worker().settle();
		expect((await attemptsOf(id)).map(({ outcome }) => outcome)).toEqual(['unknown', 'accepted']);
	});
});
