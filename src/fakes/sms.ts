import { faultRoutes } from './common/faults';
import { createFake, listen, sendJson } from './common/http';
import { endWithLauncher } from './common/launcher';
import { readSettings } from './common/settings';
import { callRoutes } from './gateway/calls';
import { mailboxRoutes } from './gateway/mailbox-proxy';
import { messageRoutes } from './gateway/messages';
import { pageRoutes } from './gateway/page';
import { phoneRoutes } from './gateway/phones';
import { createGateway, SMS_MODES } from './gateway/state';

/** The stand-in for the hosted SMS gateway, and the page of phones and mailbox. Run as a process of its own. */
endWithLauncher();
const settings = readSettings(process.env);
const gateway = createGateway(settings);
const server = createFake([
	['GET', /^\/healthz$/, ({ response }) => sendJson(response, 200, { status: 'ok', fake: 'sms' })],
	...faultRoutes(gateway.fault, SMS_MODES),
	...messageRoutes(gateway),
	...callRoutes(gateway),
	...phoneRoutes(gateway),
	...mailboxRoutes(settings.mailPort),
	...pageRoutes()
]);
await listen(server, settings.smsPort, 'FAKE_SMS_PORT');
console.log(`Phones and mailbox: http://127.0.0.1:${settings.smsPort}`);
