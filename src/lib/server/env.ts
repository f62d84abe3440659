import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';

/**
 * The checked environment. Everything that comes from outside the process is read here, once; a start with a
 * bad value stops with a list of what is wrong. The variables are explained in `.env.example`.
 */
const port = (fallback: number) => z.coerce.number().int().min(1).max(65535).default(fallback);
const flag = z.preprocess((value) => value === '1' || value === 'true', z.boolean());
const text = z.string().trim().min(1).optional();

const schema = z.object({
	PORT: port(3000),
	PUBLIC_URL: z.url().optional(),
	DATA_DIR: z.string().default('./data'),
	DATABASE_URL: z.string().startsWith('file:', 'must be a file: address').optional(),
	DEMO: flag,
	TEST_CLOCK: flag,
	TEST_CLOCK_AT: z.iso
		.datetime({ offset: true, message: 'must be an instant like 2030-05-16T12:41:00Z' })
		.optional(),
	TEST_CRASH: flag,
	RATE_LIMIT_SCALE: z.coerce.number().positive().default(1),
	HOSPITAL_NAME: z.string().default('Saltmarsh General'),
	HOSPITAL_ZONE: z.string().default('Europe/Dublin'),
	HOSPITAL_PHONE: z.string().default('+353 1 555 0100'),
	EMERGENCY_NUMBER: z.string().default('112'),
	FAKE_SMS_PORT: port(3001),
	FAKE_MAIL_PORT: port(3002),
	FAKE_SMTP_PORT: port(3003),
	LINK_SECRET: z.string().min(32, 'must have at least 32 characters').optional(),
	SMS_ACCOUNT_SID: text,
	SMS_AUTH_TOKEN: text,
	SMS_FROM: text,
	SMTP_URL: text,
	MAIL_FROM: z.string().default('Ropewalk <ropewalk@saltmarsh.example>'),
	PUSH_PUBLIC_KEY: z
		.string()
		.regex(/^[\w-]{87}$/, 'must have 87 characters of base64url')
		.optional(),
	PUSH_PRIVATE_KEY: z
		.string()
		.regex(/^[\w-]{43}$/, 'must have 43 characters of base64url')
		.optional(),
	PUSH_CONTACT: z
		.string()
		.regex(/^(mailto:|https:)/, 'must begin with mailto: or https:')
		.default('mailto:ropewalk@saltmarsh.example'),
	PUSH_HOSTS: z.string().default('fcm.googleapis.com,updates.push.services.mozilla.com,web.push.apple.com'),
	MESSAGE_DAYS: z.coerce.number().int().min(1).default(30),
	RECEIVED_DAYS: z.coerce.number().int().min(1).default(365),
	LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info')
});

export type Env = ReturnType<typeof readEnv>;

/**
 * Read and check an environment.
 * @throws Error with one line for each variable that is wrong.
 */
export function readEnv(source: Record<string, string | undefined>) {
	const parsed = schema.safeParse(source);
	if (!parsed.success) {
		const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
		throw new Error(`The environment is not usable:\n${lines.join('\n')}`);
	}
	const e = parsed.data;
	const dataDir = path.resolve(e.DATA_DIR);
	const publicUrl = (e.PUBLIC_URL ?? `http://127.0.0.1:${e.PORT}`).replace(/\/+$/, '');
	return {
		port: e.PORT,
		publicUrl,
		secure: publicUrl.startsWith('https:'),
		dataDir,
		databaseUrl: e.DATABASE_URL ?? `file:${path.join(dataDir, 'ropewalk.db')}`,
		demo: e.DEMO,
		testClock: e.DEMO && e.TEST_CLOCK,
		/** Where the demonstration's clock stands still, milliseconds UTC; null where it goes. */
		testClockAt: e.DEMO && e.TEST_CLOCK && e.TEST_CLOCK_AT ? Date.parse(e.TEST_CLOCK_AT) : null,
		/** Whether a test wants the process killed once; see `src/lib/server/outbox/crash-point.ts`. */
		testCrash: e.DEMO && e.TEST_CLOCK && e.TEST_CRASH,
		// Only the demonstration may loosen its request limits; production keeps them.
		rateLimitScale: e.DEMO ? e.RATE_LIMIT_SCALE : 1,
		hospital: {
			name: e.HOSPITAL_NAME,
			zone: e.HOSPITAL_ZONE,
			phone: e.HOSPITAL_PHONE,
			emergency: e.EMERGENCY_NUMBER
		},
		fakes: { sms: e.FAKE_SMS_PORT, mail: e.FAKE_MAIL_PORT, smtp: e.FAKE_SMTP_PORT },
		/** The key of the links in messages; null where the one in the data folder is used. */
		linkSecret: e.LINK_SECRET ?? null,
		sms: smsGateway(e),
		mail: mailGateway(e),
		push: pushGateway(e),
		/** Who mails and calendar files come from, also where no mail server is set up. */
		mailFrom: e.MAIL_FROM,
		/** How many days what messages said is kept: ours after their end, those that came in after they came. */
		retention: { sentDays: e.MESSAGE_DAYS, receivedDays: e.RECEIVED_DAYS },
		logLevel: e.LOG_LEVEL
	};
}

type Raw = z.infer<typeof schema>;

/** The gateway to send through, or null: then messages are held and shown as held. */
function smsGateway(e: Raw) {
	if (e.DEMO) {
		return {
			accountSid: e.SMS_ACCOUNT_SID ?? `AC${'0'.repeat(32)}`,
			authToken: e.SMS_AUTH_TOKEN ?? 'ropewalk-demo-token',
			from: e.SMS_FROM ?? '+353860000000',
			baseUrl: `http://127.0.0.1:${e.FAKE_SMS_PORT}`
		};
	}
	if (!e.SMS_ACCOUNT_SID || !e.SMS_AUTH_TOKEN || !e.SMS_FROM) {
		return null;
	}
	return { accountSid: e.SMS_ACCOUNT_SID, authToken: e.SMS_AUTH_TOKEN, from: e.SMS_FROM, baseUrl: null };
}

function mailGateway(e: Raw) {
	if (e.DEMO) {
		return {
			url: e.SMTP_URL ?? `smtp://127.0.0.1:${e.FAKE_SMTP_PORT}`,
			from: e.MAIL_FROM,
			requireTls: false
		};
	}
	return e.SMTP_URL ? { url: e.SMTP_URL, from: e.MAIL_FROM, requireTls: true } : null;
}

/** Known to everybody, and good for nothing: in a demonstration only the stand-in is written to. */
const DEMO_PUSH_KEYS = {
	publicKey: 'BCUqBUPzc8sZBbo-sVUma2KndlyELjcDmgY6M0tHfGdBlwWYk7NZJTT4gHJ3CxTlRbpWlv5YSsqjo0Zq5OQni_I',
	privateKey: 'cD1WGVM6uNtYF_LCdXJamAZWeWP4HS2eulqWF5AZLN4'
};

/**
 * The key that push services know us by, whom they may write to about it, and the services that may be written to.
 * Null without keys: then no device can be turned on, and what waits for one is held.
 */
function pushGateway(e: Raw) {
	const contact = e.PUSH_CONTACT;
	if (e.DEMO) {
		const standIn = `http://127.0.0.1:${e.FAKE_SMS_PORT}`;
		return { ...DEMO_PUSH_KEYS, contact, hosts: [new URL(standIn).host], standIn };
	}
	if (!e.PUSH_PUBLIC_KEY || !e.PUSH_PRIVATE_KEY) {
		return null;
	}
	const hosts = e.PUSH_HOSTS.split(',').map((host) => host.trim().toLowerCase());
	const keys = { publicKey: e.PUSH_PUBLIC_KEY, privateKey: e.PUSH_PRIVATE_KEY };
	return { ...keys, contact, hosts: hosts.filter((host) => host !== ''), standIn: null };
}

let current: Env | null = null;

/** The environment of this process, read at the first call; the data folder exists afterwards. */
export function env(): Env {
	if (!current) {
		current = readEnv(process.env);
		mkdirSync(current.dataDir, { recursive: true, mode: 0o700 });
	}
	return current;
}
