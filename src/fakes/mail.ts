import { faultRoutes } from './common/faults';
import { createFake, listen, sendJson } from './common/http';
import { endWithLauncher } from './common/launcher';
import { readSettings } from './common/settings';
import { mailRoutes } from './mailbox/mails';
import { createSmtp } from './mailbox/smtp';
import { createMailbox, MAIL_MODES } from './mailbox/state';

/** The stand-in for a mail server: SMTP to send to, HTTP to look at what came. Run as a process of its own. */
endWithLauncher();
const settings = readSettings(process.env);
const mailbox = createMailbox();
const smtp = createSmtp(mailbox);
const server = createFake([
	['GET', /^\/healthz$/, ({ response }) => sendJson(response, 200, { status: 'ok', fake: 'mail' })],
	...faultRoutes(mailbox.fault, MAIL_MODES),
	...mailRoutes(mailbox)
]);
// A client that goes away in the middle of a mail is no reason to end.
smtp.on('error', (error) => console.error(error.message));
await listen(smtp.server, settings.smtpPort, 'FAKE_SMTP_PORT');
await listen(server, settings.mailPort, 'FAKE_MAIL_PORT');
console.log(`Mail: smtp://127.0.0.1:${settings.smtpPort}, http://127.0.0.1:${settings.mailPort}/mails`);
