import { randomBytes } from 'node:crypto';
import { TLSSocket } from 'node:tls';
import { takeFault } from '../common/faults';
import { readBytes, Refusal, sendJson, type Exchange, type Route } from '../common/http';
import { decrypt } from './decrypt';
import type { Device, PushMode, PushService } from './state';
import { senderOf } from './vapid';

/** What every service takes, RFC 8030 section 7.2; more may be refused. */
const BODY_LIMIT_BYTES = 4096;

/** The side that senders write to, over TLS alone: one message for one device. */
export function pushRoutes(service: PushService): Route[] {
	return [['POST', /^\/push\/to\/(\w+)$/, (exchange) => receive(service, exchange)]];
}

async function receive(service: PushService, exchange: Exchange): Promise<void> {
	const { request, response, parts } = exchange;
	if (!(request.socket instanceof TLSSocket)) {
		throw new Refusal(400, 'Messages are taken over TLS alone.');
	}
	const device = service.devices.get(parts[0] ?? '');
	const body = await readBytes(request);
	const mode = takeFault<PushMode>(service.fault);
	if (!carryOut(exchange, mode)) {
		return;
	}
	if (!device) {
		throw new Refusal(404, 'There is no such device.');
	}
	if (device.gone) {
		throw new Refusal(410, 'This device has taken its permission away.');
	}
	const id = show(service, device, exchange, body);
	if (mode === 'accept-then-drop') {
		request.socket.destroy();
		return;
	}
	response.writeHead(201, { Location: `/push/message/${id}` }).end();
}

/** Carries out the faults in which nothing is shown. Answers whether the message may go on. */
function carryOut({ request, response }: Exchange, mode: PushMode): boolean {
	switch (mode) {
		case '404':
		case '410':
		case '500':
			sendJson(response, Number(mode), { status: Number(mode) });
			return false;
		case '429':
			sendJson(response, 429, { status: 429 }, { 'Retry-After': '1' });
			return false;
		case 'refuse':
			request.socket.destroy();
			return false;
		case 'hang':
			return false;
		default:
			return true;
	}
}

/** Checks sender and form, decrypts, and shows it. A message of the same topic takes the place of the one before. */
function show(service: PushService, device: Device, { request }: Exchange, body: Buffer): string {
	checkSender(device, request.headers.authorization ?? '', `https://${request.headers.host}`);
	const { ttl, urgency, topic, 'content-encoding': encoding } = request.headers;
	if (!/^\d{1,9}$/.test(String(ttl)) || encoding !== 'aes128gcm') {
		throw new Refusal(400, 'TTL or the content encoding is missing.');
	}
	if (body.length > BODY_LIMIT_BYTES) {
		throw new Refusal(413, `The body is over ${BODY_LIMIT_BYTES} bytes.`);
	}
	const notice = {
		id: randomBytes(8).toString('hex'),
		at: Date.now(),
		payload: readPayload(device, body),
		urgency: String(urgency ?? 'normal'),
		topic: topic === undefined ? null : String(topic),
		ttlSeconds: Number(ttl)
	};
	const others = device.notices.filter((before) => notice.topic === null || before.topic !== notice.topic);
	device.notices = [...others, notice];
	service.version += 1;
	return notice.id;
}

function checkSender(device: Device, authorization: string, origin: string): void {
	let sender: string;
	try {
		sender = senderOf(authorization, origin, Date.now());
	} catch (error) {
		throw new Refusal(401, error instanceof Error ? error.message : 'Not signed.');
	}
	if (device.sender !== null && sender !== device.sender) {
		throw new Refusal(403, 'This device takes messages of another sender.');
	}
}

function readPayload(device: Device, body: Buffer): Record<string, unknown> {
	try {
		return JSON.parse(decrypt(device, body)) as Record<string, unknown>;
	} catch {
		throw new Refusal(400, 'The message was not encrypted for this device.');
	}
}
