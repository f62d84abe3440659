/** What the fakes share with the application, by environment only: they import nothing of it. */
export interface FakeSettings {
	/** Account identifier and token that the application signs in to the gateway with. */
	accountSid: string;
	authToken: string;
	/** The number that the application sends from, E.164. */
	from: string;
	/** Where the application is reached, without a slash at the end; inbound messages are posted below it. */
	publicUrl: string;
	smsPort: number;
	mailPort: number;
	smtpPort: number;
	/** How late the gateway answers in the mode `slow`, milliseconds. */
	slowMs: number;
}

const DEMO_ACCOUNT = `AC${'0'.repeat(32)}`;

/**
 * Reads the settings from the environment.
 * @throws Error naming the variable, its value and the limits, when a number cannot be used.
 */
export function readSettings(env: NodeJS.ProcessEnv): FakeSettings {
	const port = portOf(env, 'PORT', 3000);
	return {
		accountSid: env.SMS_ACCOUNT_SID || DEMO_ACCOUNT,
		authToken: env.SMS_AUTH_TOKEN || 'ropewalk-demo-token',
		from: env.SMS_FROM || '+353860000000',
		publicUrl: (env.PUBLIC_URL || `http://127.0.0.1:${port}`).replace(/\/+$/, ''),
		smsPort: portOf(env, 'FAKE_SMS_PORT', 3001),
		mailPort: portOf(env, 'FAKE_MAIL_PORT', 3002),
		smtpPort: portOf(env, 'FAKE_SMTP_PORT', 3003),
		slowMs: wholeNumber(env, 'FAKE_SLOW_MS', 10_000, 0, 600_000)
	};
}

function portOf(env: NodeJS.ProcessEnv, name: string, fallback: number): number {
	return wholeNumber(env, name, fallback, 1, 65_535);
}

function wholeNumber(
	env: NodeJS.ProcessEnv,
	name: string,
	fallback: number,
	min: number,
	max: number
): number {
	const text = env[name];
	if (!text) {
		return fallback;
	}
	const value = Number(text);
	if (!Number.isInteger(value) || value < min || value > max) {
		throw new Error(`${name} is '${text}': it must be a whole number from ${min} to ${max}.`);
	}
	return value;
}
