import { createTransport } from 'nodemailer';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { itemsOf, sendJson, startFakes, type Fakes } from '../support/fakes';
import { receiveHooks, type HookReceiver } from '../support/hook-receiver';

/** The mail fake, written to by the very client that the application uses, and the page that shows both fakes. */

let app: HookReceiver;
let fakes: Fakes;

beforeAll(async () => {
	app = await receiveHooks();
	fakes = await startFakes(app.url);
});

afterAll(async () => {
	await fakes.stop();
	await app.close();
});

afterEach(() => sendJson('PUT', `${fakes.mailUrl}/faults`, { mode: 'ok' }));

describe('mail', () => {
	interface Mail {
		at: string;
		to: string;
		subject: string;
		text: string;
		html: string | null;
		attachments: { filename: string; contentType: string; size: number; content: string }[];
	}

	const deliver = (subject: string) =>
		createTransport({ host: '127.0.0.1', port: fakes.smtpPort, secure: false }).sendMail({
			from: { name: 'Ropewalk', address: 'ropewalk@saltmarsh.example' },
			to: { name: 'Ó Néill', address: 'surgeon@saltmarsh.example' },
			bcc: { name: '', address: 'hidden@saltmarsh.example' },
			subject,
			text: 'Tern Ward, bed T4: ő €',
			html: '<p>Tern Ward</p>',
			attachments: [{ filename: 'visits.ics', content: 'BEGIN:VCALENDAR', contentType: 'text/calendar' }]
		});
	const mails = async (subject: string) =>
		(await itemsOf<Mail>(`${fakes.mailUrl}/mails`)).filter((mail) => mail.subject === subject);
	const mailFault = (mode: string, count?: number) =>
		sendJson('PUT', `${fakes.mailUrl}/faults`, { mode, ...(count ? { count } : {}) });

	it('arrives whole, with everybody it went to', async () => {
		await deliver('whole');
		const [mail] = await mails('whole');
		expect(mail).toMatchObject({
			to: 'surgeon@saltmarsh.example, hidden@saltmarsh.example',
			html: '<p>Tern Ward</p>',
			attachments: [{ filename: 'visits.ics', contentType: 'text/calendar', size: 15 }]
		});
		expect(mail?.text.trim()).toBe('Tern Ward, bed T4: ő €');
		expect(mail?.attachments[0]?.content).toBe(Buffer.from('BEGIN:VCALENDAR').toString('base64'));
	});

	it('is shown beside the phones, its attachments as downloads', async () => {
		await deliver('beside');
		const items = await itemsOf<Mail & { id: string }>(`${fakes.smsUrl}/mailbox/mails`);
		const id = items.find((mail) => mail.subject === 'beside')?.id;
		const file = await fetch(`${fakes.smsUrl}/mailbox/mails/${id}/attachments/0`);
		expect(file.headers.get('content-disposition')).toBe("attachment; filename*=UTF-8''visits.ics");
		expect(await file.text()).toBe('BEGIN:VCALENDAR');
	});

	it.each([
		['greylist', { code: 'EENVELOPE', responseCode: 451 }],
		['reject', { code: 'EENVELOPE', responseCode: 550 }]
	])('%s: is refused once for each mail, not for each recipient', async (mode, error) => {
		await mailFault(mode, 1);
		await expect(deliver(mode)).rejects.toMatchObject(error);
		await deliver(mode);
		expect(await mails(mode)).toHaveLength(1);
	});

	it('drop: is cut off after the text and is not kept', async () => {
		await mailFault('drop', 1);
		await expect(deliver('drop')).rejects.toThrow();
		expect(await mails('drop')).toEqual([]);
	});

	it('refuses an unknown mode', async () => {
		expect((await mailFault('lose')).status).toBe(422);
	});
});

describe('the page', () => {
	it.each([
		'/',
		'/page.css',
		'/page.js',
		'/phones.js',
		'/notices.js',
		'/mailbox.js',
		'/elements.js',
		'/rope.js'
	])('serves %s under a policy of its own', async (path) => {
		const response = await fetch(fakes.smsUrl + path);
		expect(response.status).toBe(200);
		expect(response.headers.get('content-security-policy')).toContain("default-src 'none'");
	});

	it('does not serve what is not its own', async () => {
		expect((await fetch(`${fakes.smsUrl}/../sms.ts`)).status).toBe(404);
	});

	it('answers nothing new in a few bytes', async () => {
		const tag = (await fetch(`${fakes.smsUrl}/phones`)).headers.get('etag') ?? '';
		const again = await fetch(`${fakes.smsUrl}/phones`, { headers: { 'If-None-Match': tag } });
		expect(again.status).toBe(304);
	});

	it('is not used by a page from elsewhere', async () => {
		const headers = { Origin: 'https://elsewhere.example', 'Content-Type': 'text/plain' };
		const body = '{"body":"YES"}';
		const response = await fetch(`${fakes.smsUrl}/phones/+353860000101/reply`, {
			method: 'POST',
			headers,
			body
		});
		expect(response.status).toBe(403);
		expect(app.hooks).toEqual([]);
	});
});
