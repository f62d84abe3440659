import twilio from 'twilio';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { FROM, gatewayClient, phoneOf, sendJson, startFakes, type Fakes } from '../support/fakes';
import { receiveHooks, TOKEN, type Hook, type HookReceiver } from '../support/hook-receiver';

/** The SMS fake as a process, spoken to by the very SDK that the application uses. */

const NURSE = '+353860000101';
const SLOW_MS = 900;

let app: HookReceiver;
let fakes: Fakes;

beforeAll(async () => {
	app = await receiveHooks();
	fakes = await startFakes(app.url, SLOW_MS);
});

afterAll(async () => {
	await fakes.stop();
	await app.close();
});

beforeEach(() => {
	app.hooks.length = 0;
	app.answer.status = 200;
	app.answer.body = '';
});

afterEach(async () => {
	await sendJson('PUT', `${fakes.smsUrl}/faults`, { mode: 'ok' });
});

const phone = (number: string) => phoneOf(fakes, number);

/** Texts differ, so that a test finds its own message among those of the others. */
let texts = 0;
const callbackPath = () => `/api/hooks/sms-status?message=${texts}`;
function send(client = gatewayClient(fakes.smsUrl), more: Record<string, string> = {}) {
	texts += 1;
	return client.messages.create({
		to: NURSE,
		from: FROM,
		body: `Tern Ward, bed T${texts}`,
		statusCallback: app.url + callbackPath(),
		...more
	});
}

const isSigned = (hook: Hook) => app.isSigned(hook);

const fault = (mode: string, count?: number) =>
	sendJson('PUT', `${fakes.smsUrl}/faults`, { mode, ...(count ? { count } : {}) });

describe('sending a message', () => {
	it('answers as the gateway does and reaches the phone', async () => {
		const sent = await send();
		expect(sent).toMatchObject({
			to: NURSE,
			from: FROM,
			status: 'queued',
			direction: 'outbound-api',
			numSegments: '1',
			errorCode: null,
			dateSent: null
		});
		expect(sent.sid).toMatch(/^SM[0-9a-f]{32}$/);
		expect(sent.dateCreated).toBeInstanceOf(Date);
		const shown = (await phone(NURSE))?.messages.find(({ sid }) => sid === sent.sid);
		expect(shown).toMatchObject({ direction: 'out', body: sent.body });
		expect(shown?.at).toMatch(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/);
	});

	it('posts signed callbacks without an origin: queued, sent, delivered', async () => {
		const sent = await send();
		const hooks = await app.arrived(callbackPath(), 3);
		expect(hooks.map(({ fields }) => fields.MessageStatus)).toEqual(['queued', 'sent', 'delivered']);
		expect(hooks.map(({ fields }) => fields.MessageSid)).toEqual([sent.sid, sent.sid, sent.sid]);
		expect(hooks.map(isSigned)).toEqual([true, true, true]);
		expect(hooks[0]?.headers.origin).toBeUndefined();
	});

	it('signs with the token: another one does not fit', async () => {
		await send();
		const [hook] = await app.arrived(callbackPath(), 1);
		const signature = String(hook?.headers['x-twilio-signature']);
		const url = app.url + String(hook?.path);
		expect(twilio.validateRequest('another', signature, url, hook?.fields ?? {})).toBe(false);
	});

	it.each([
		['a number that is none', { to: '0860000101' }, 21211],
		['a sender that is not ours', { from: '+353860000009' }, 21606],
		['no words', { body: '' }, 21602],
		['1601 characters', { body: 'x'.repeat(1601) }, 21617]
	])('refuses %s', async (_what, more, code) => {
		await expect(send(undefined, more)).rejects.toMatchObject({ status: 400, code });
	});

	it('takes 1600 characters', async () => {
		expect((await send(undefined, { body: 'x'.repeat(1600) })).numSegments).toBe('11');
	});

	it('refuses a wrong token', async () => {
		await expect(send(gatewayClient(fakes.smsUrl, 'wrong'))).rejects.toMatchObject({
			status: 401,
			code: 20003
		});
	});

	it('does not write to a phone that replied STOP, until it replies START', async () => {
		const patient = '+353860000199';
		await sendJson('POST', `${fakes.smsUrl}/phones/${patient}/reply`, { body: 'Stop' });
		await expect(send(undefined, { to: patient })).rejects.toMatchObject({ status: 400, code: 21610 });
		await sendJson('POST', `${fakes.smsUrl}/phones/${patient}/reply`, { body: 'START' });
		expect((await send(undefined, { to: patient })).to).toBe(patient);
	});
});

describe('looking messages up', () => {
	it('finds one by its identifier', async () => {
		const sent = await send();
		await app.arrived(callbackPath(), 3);
		const found = await gatewayClient(fakes.smsUrl).messages(sent.sid).fetch();
		expect(found).toMatchObject({ sid: sent.sid, body: sent.body, status: 'delivered' });
		expect(found.dateSent).toBeInstanceOf(Date);
	});

	it('says 404 for an unknown one', async () => {
		const unknown = gatewayClient(fakes.smsUrl).messages(`SM${'0'.repeat(32)}`);
		await expect(unknown.fetch()).rejects.toMatchObject({ status: 404, code: 20404 });
	});

	it('lists those to one number, newest first, through all pages', async () => {
		const to = '+353860000150';
		const client = gatewayClient(fakes.smsUrl);
		for (const body of ['one', 'two', 'three']) {
			await send(client, { to, body });
		}
		const found = await client.messages.list({ to, pageSize: 2 });
		expect(found.map(({ body }) => body)).toEqual(['three', 'two', 'one']);
		expect(await client.messages.list({ to, limit: 1 })).toHaveLength(1);
	});

	it.each([
		['since an hour ago', { dateSentAfter: -1 }, 1],
		['since an hour ahead', { dateSentAfter: 1 }, 0],
		['until an hour ago', { dateSentBefore: -1 }, 0],
		['until an hour ahead', { dateSentBefore: 1 }, 1],
		['today', { dateSent: 0 }, 1],
		['on another day', { dateSent: -48 }, 0]
	])('filters by the time of sending: %s', async (_when, bound, count) => {
		const to = `+3538601${10_000 + texts}`;
		const client = gatewayClient(fakes.smsUrl);
		const { dateCreated } = await send(client, { to });
		const at = Object.entries(bound).map(([name, hours]) => [
			name,
			new Date(dateCreated.getTime() + hours * 3_600_000)
		]);
		expect(await client.messages.list({ to, ...Object.fromEntries(at) })).toHaveLength(count);
	});
});

describe('replying', () => {
	it('posts a signed webhook and tells what it answered', async () => {
		const answer = await sendJson('POST', `${fakes.smsUrl}/phones/${encodeURIComponent(NURSE)}/reply`, {
			body: 'YES & thanks'
		});
		expect(answer).toMatchObject({ status: 200, body: { status: 200 } });
		const [hook] = await app.arrived('/api/hooks/sms', 1);
		expect(hook?.fields).toMatchObject({
			From: NURSE,
			To: FROM,
			Body: 'YES & thanks',
			MessageSid: answer.body.sid
		});
		expect(hook && isSigned(hook)).toBe(true);
		expect(hook?.headers.origin).toBeUndefined();
		expect((await phone(NURSE))?.messages.at(-1)).toMatchObject({
			direction: 'in',
			body: 'YES & thanks',
			status: 'received'
		});
	});

	it('shows a refusal of the webhook', async () => {
		app.answer.status = 403;
		const answer = await sendJson('POST', `${fakes.smsUrl}/phones/${NURSE}/reply`, { body: 'YES' });
		expect(answer).toMatchObject({ status: 200, body: { status: 403 } });
	});

	it('delivers what the webhook answers with', async () => {
		app.answer.body = '<Response><Message>Confirmed &amp; noted</Message></Response>';
		await sendJson('POST', `${fakes.smsUrl}/phones/${NURSE}/reply`, { body: 'YES' });
		expect((await phone(NURSE))?.messages.at(-1)).toMatchObject({
			direction: 'out',
			body: 'Confirmed & noted'
		});
	});

	it.each([
		['no words', NURSE, '  ', 'body must be a text of 1 to 1600 characters.'],
		['a number that is none', '12', 'YES', "number is '12': it must be like +353860000001."]
	])('refuses %s', async (_what, number, body, detail) => {
		const answer = await sendJson('POST', `${fakes.smsUrl}/phones/${number}/reply`, { body });
		expect(answer).toEqual({ status: 422, body: { status: 422, detail } });
	});
});

describe('owners', () => {
	it('are told by the application', async () => {
		const items = [{ number: '+353860000160', owner: 'R. Ferris, nurse' }];
		expect((await sendJson('PUT', `${fakes.smsUrl}/phones`, { items })).status).toBe(200);
		expect(await phone('+353860000160')).toMatchObject({ owner: 'R. Ferris, nurse', messages: [] });
	});

	it.each([
		['no list', undefined, 'items must be a list of {number, owner}.'],
		['no number', [{ owner: 'A' }], "items[0].number is 'undefined': it must be like +353860000001."],
		['no owner', [{ number: NURSE }], 'items[0].owner must be a text of 1 to 200 characters.']
	])('are refused with %s', async (_what, items, detail) => {
		const answer = await sendJson('PUT', `${fakes.smsUrl}/phones`, { items });
		expect(answer).toEqual({ status: 422, body: { status: 422, detail } });
	});
});

describe('misbehaving', () => {
	it('refuses an unknown mode and a count below one', async () => {
		expect((await fault('sometimes')).status).toBe(422);
		expect((await sendJson('PUT', `${fakes.smsUrl}/faults`, { mode: '500', count: 0 })).status).toBe(422);
	});

	it.each([
		['500', { status: 500, code: 20500 }],
		['429', { status: 429, code: 20429 }],
		['refuse', { code: 'ECONNRESET' }]
	])('%s: accepts nothing, for as many requests as asked', async (mode, error) => {
		await fault(mode, 2);
		await expect(send()).rejects.toMatchObject(error);
		await expect(send()).rejects.toMatchObject(error);
		expect((await send()).status).toBe('queued');
		const bodies = (await phone(NURSE))?.messages.map(({ body }) => body) ?? [];
		expect(bodies.filter((body) => body === `Tern Ward, bed T${texts - 1}`)).toEqual([]);
	});

	it('429: says when to come back', async () => {
		await fault('429', 1);
		const client = gatewayClient(fakes.smsUrl);
		await expect(send(client)).rejects.toMatchObject({ status: 429 });
		expect(client.httpClient?.lastResponse).toMatchObject({ headers: { 'retry-after': '1' } });
	});

	it.each([
		['slow', 'ECONNABORTED'],
		['accept-then-drop', 'ECONNRESET']
	])('%s: has the message although the sender does not know', async (mode, code) => {
		await fault(mode, 1);
		await expect(send(gatewayClient(fakes.smsUrl, TOKEN, SLOW_MS / 3))).rejects.toMatchObject({ code });
		const found = await gatewayClient(fakes.smsUrl).messages.list({ to: NURSE, limit: 1 });
		expect(found[0]?.body).toBe(`Tern Ward, bed T${texts}`);
	});

	it('undelivered: ends with an error number', async () => {
		await fault('undelivered', 1);
		const { sid } = await send();
		const hooks = await app.arrived(callbackPath(), 3);
		expect(hooks.map(({ fields }) => fields.MessageStatus)).toEqual(['queued', 'sent', 'undelivered']);
		expect(hooks[2]?.fields.ErrorCode).toBe('30003');
		expect(await gatewayClient(fakes.smsUrl).messages(sid).fetch()).toMatchObject({
			status: 'undelivered',
			errorCode: 30003
		});
	});

	it('duplicate-callbacks: posts the whole row twice, an old status after the last', async () => {
		await fault('duplicate-callbacks', 1);
		const { sid } = await send();
		const hooks = await app.arrived(callbackPath(), 6);
		const row = ['queued', 'sent', 'delivered'];
		expect(hooks.map(({ fields }) => fields.MessageStatus)).toEqual([...row, ...row]);
		expect((await gatewayClient(fakes.smsUrl).messages(sid).fetch()).status).toBe('delivered');
	});
});
