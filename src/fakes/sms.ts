import { faultRoutes } from './common/faults';
import { createBoth } from './common/both';
import { listen, sendJson, type Route } from './common/http';
import { endWithLauncher } from './common/launcher';
import { readSettings } from './common/settings';
import { callRoutes } from './gateway/calls';
import { mailboxRoutes } from './gateway/mailbox-proxy';
import { messageRoutes } from './gateway/messages';
import { pageRoutes } from './gateway/page';
import { phoneRoutes } from './gateway/phones';
import { createGateway, SMS_MODES } from './gateway/state';
import { makeCertificate } from './push/certificate';
import { deviceRoutes } from './push/devices';
import { pushRoutes } from './push/messages';
import { createPushService, PUSH_MODES } from './push/state';

/**
 * The stand-ins for the hosted SMS gateway and for the browsers' push service, and the page of phones and mailbox. Run
 * as a process of its own. Push services speak TLS alone: that stands on the same port.
 */
endWithLauncher();
const settings = readSettings(process.env);
const gateway = createGateway(settings);
const push = createPushService();
const certificate = await makeCertificate();
const routes: Route[] = [
	['GET', /^\/healthz$/, ({ response }) => sendJson(response, 200, { status: 'ok', fake: 'sms' })],
	...faultRoutes(gateway.fault, SMS_MODES),
	...messageRoutes(gateway),
	...callRoutes(gateway),
	...phoneRoutes(gateway),
	...mailboxRoutes(settings.mailPort),
	...faultRoutes(push.fault, PUSH_MODES, /^\/push\/faults$/),
	...pushRoutes(push),
	...deviceRoutes(push, certificate.cert),
	...pageRoutes()
];
const server = createBoth(routes, certificate);
await listen(server, settings.smsPort, 'FAKE_SMS_PORT');
console.log(`Phones and mailbox: http://127.0.0.1:${settings.smsPort}`);
