import { afterAll, afterEach, beforeAll, beforeEach, expect, it } from 'vitest';
import { FROM, gatewayClient, phoneOf, sendJson, startFakes, type Fakes } from '../support/fakes';
import { receiveHooks, type HookReceiver } from '../support/hook-receiver';

/** Telephone calls of the SMS fake, made by the very SDK that the application uses. */

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

beforeEach(() => {
	app.hooks.length = 0;
	app.answer.body = '';
});

afterEach(() => sendJson('PUT', `${fakes.smsUrl}/faults`, { mode: 'ok' }));

const ask = (action: string) =>
	`<Response><Gather numDigits="1" action="${action}"><Say>Press 1</Say></Gather></Response>`;

it('rings, is picked up, posts the pressed digit signed, and says what is answered', async () => {
	app.answer.body = '<Response><Say>It is yours.</Say></Response>';
	const client = gatewayClient(fakes.smsUrl);
	const call = await client.calls.create({
		to: '+353860000170',
		from: FROM,
		twiml: ask(`${app.url}/api/hooks/digit?call=1`),
		statusCallback: `${app.url}/call-status`,
		statusCallbackEvent: ['ringing', 'answered', 'completed']
	});
	expect(call.sid).toMatch(/^CA[0-9a-f]{32}$/);
	await app.arrived('/call-status', 2);
	const pressed = await sendJson('POST', `${fakes.smsUrl}/calls/${call.sid}/digits`, { digits: '1' });
	expect(pressed).toMatchObject({ status: 200, body: { status: 200 } });
	const [hook] = await app.arrived('/api/hooks/digit?call=1', 1);
	expect(hook?.fields).toMatchObject({ CallSid: call.sid, Digits: '1', CallStatus: 'in-progress' });
	expect(hook && app.isSigned(hook)).toBe(true);
	const statuses = (await app.arrived('/call-status', 3)).map(({ fields }) => fields.CallStatus);
	expect(statuses).toEqual(['ringing', 'in-progress', 'completed']);
	expect((await phoneOf(fakes, '+353860000170'))?.calls).toMatchObject([
		{ sid: call.sid, said: ['Press 1', 'It is yours.'], pressed: '1', status: 'completed' }
	]);
	expect((await client.calls(call.sid).fetch()).status).toBe('completed');
});

it('fetches its words from an address', async () => {
	app.answer.body = '<Response><Say>Hello</Say></Response>';
	const url = `${app.url}/words`;
	await gatewayClient(fakes.smsUrl).calls.create({
		...{ to: '+353860000171', from: FROM, url },
		statusCallback: `${app.url}/call-status`
	});
	const [hook] = await app.arrived('/words', 1);
	expect(hook && app.isSigned(hook)).toBe(true);
	await app.arrived('/call-status', 1);
	expect((await phoneOf(fakes, '+353860000171'))?.calls).toMatchObject([
		{ said: ['Hello'], status: 'completed' }
	]);
});

it('can be hung up, and takes no digit then', async () => {
	const client = gatewayClient(fakes.smsUrl);
	const call = await client.calls.create({ to: '+353860000172', from: FROM, twiml: ask(app.url) });
	expect((await client.calls(call.sid).update({ status: 'completed' })).status).toBe('completed');
	const pressed = await sendJson('PUT', `${fakes.smsUrl}/calls/${call.sid}/digits`, { digits: '1' });
	expect(pressed.status).toBe(409);
});

it('is not answered in the mode undelivered', async () => {
	await sendJson('PUT', `${fakes.smsUrl}/faults`, { mode: 'undelivered', count: 1 });
	const statusCallback = `${app.url}/call-status`;
	await gatewayClient(fakes.smsUrl).calls.create({
		to: '+353860000173',
		from: FROM,
		twiml: ask(app.url),
		statusCallback
	});
	const [hook] = await app.arrived('/call-status', 1);
	expect(hook?.fields.CallStatus).toBe('no-answer');
});
