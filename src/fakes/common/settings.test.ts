import { describe, expect, it } from 'vitest';
import { readSettings } from './settings';

describe('readSettings', () => {
	it('has a default for everything', () => {
		expect(readSettings({})).toEqual({
			accountSid: 'AC00000000000000000000000000000000',
			authToken: 'ropewalk-demo-token',
			from: '+353860000000',
			publicUrl: 'http://127.0.0.1:3000',
			smsPort: 3001,
			mailPort: 3002,
			smtpPort: 3003,
			slowMs: 10_000
		});
	});

	it.each([
		['the port of the application', { PORT: '3100' }, 'http://127.0.0.1:3100'],
		['the public address, without its last slash', { PUBLIC_URL: 'https://a.test/' }, 'https://a.test']
	])('posts to %s', (_what, env, publicUrl) => {
		expect(readSettings(env).publicUrl).toBe(publicUrl);
	});

	it.each(['0', '65536', '3001.5', 'three'])('refuses the port %s by its name', (FAKE_SMS_PORT) => {
		expect(() => readSettings({ FAKE_SMS_PORT })).toThrow(
			`FAKE_SMS_PORT is '${FAKE_SMS_PORT}': it must be a whole number from 1 to 65535.`
		);
	});

	it.each(['1', '65535'])('takes the port %s', (port) => {
		expect(readSettings({ FAKE_SMS_PORT: port }).smsPort).toBe(Number(port));
	});
});
