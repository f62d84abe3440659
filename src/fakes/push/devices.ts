import { readJson, Refusal, sendJson, sendTagged, type Exchange, type Route } from '../common/http';
import { addDevice, type Device, type PushService } from './state';

/** The side for people and tests: subscribe a made-up browser, look at what it shows, take its permission away. */
export function deviceRoutes(service: PushService, certificate: string): Route[] {
	return [
		[
			'GET',
			/^\/push\/certificate$/,
			({ response }) =>
				void response.writeHead(200, { 'Content-Type': 'application/x-pem-file' }).end(certificate)
		],
		[
			'GET',
			/^\/push\/devices$/,
			(exchange) => {
				const tag = `"${service.boot}-${service.version}"`;
				sendTagged(exchange, tag, () => ({ items: [...service.devices.values()].map(viewDevice) }));
			}
		],
		['POST', /^\/push\/devices$/, (exchange) => subscribe(service, exchange)],
		['DELETE', /^\/push\/devices\/(\w+)$/, (exchange) => takeAway(service, exchange)]
	];
}

/** Answers what a browser hands to a page: `PushSubscription` as JSON. */
async function subscribe(service: PushService, { request, response }: Exchange): Promise<void> {
	const { owner, applicationServerKey } = await readJson(request);
	if (typeof owner !== 'string' || owner === '') {
		throw new Refusal(422, 'owner is missing: say whose device it is.');
	}
	const sender = typeof applicationServerKey === 'string' ? applicationServerKey : null;
	const device = addDevice(service, owner, sender);
	const p256dh = device.keys.getPublicKey().toString('base64url');
	sendJson(response, 201, {
		endpoint: `https://${request.headers.host}/push/to/${device.id}`,
		keys: { p256dh, auth: device.auth.toString('base64url') }
	});
}

function takeAway(service: PushService, { response, parts }: Exchange): void {
	const device = service.devices.get(parts[0] ?? '');
	if (!device) {
		throw new Refusal(404, 'There is no such device.');
	}
	device.gone = true;
	service.version += 1;
	response.writeHead(204).end();
}

function viewDevice({ id, owner, gone, notices }: Device): unknown {
	return {
		id,
		owner,
		gone,
		notices: notices.map((notice) => ({ ...notice, at: new Date(notice.at).toISOString() }))
	};
}
