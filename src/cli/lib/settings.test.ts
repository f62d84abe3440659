import { describe, expect, it } from 'vitest';
import { settingsOf } from './settings.mjs';

describe('settingsOf', () => {
	it('fills in what a demonstration leaves open', () => {
		expect(settingsOf({}, { demo: true }).env).toEqual({
			PORT: '3000',
			HOST: '127.0.0.1',
			PUBLIC_URL: 'http://127.0.0.1:3000',
			ORIGIN: 'http://127.0.0.1:3000',
			DATA_DIR: './data',
			SHUTDOWN_TIMEOUT: '5',
			DEMO: '1',
			FAKE_SMS_PORT: '3001',
			FAKE_MAIL_PORT: '3002',
			FAKE_SMTP_PORT: '3003'
		});
	});

	it('leaves the stand-ins out of production and listens everywhere', () => {
		const { env } = settingsOf({ PORT: '80', PUBLIC_URL: 'https://a.test/' }, { demo: false });
		expect(env).toEqual({
			PORT: '80',
			HOST: '0.0.0.0',
			PUBLIC_URL: 'https://a.test',
			ORIGIN: 'https://a.test',
			DATA_DIR: './data',
			SHUTDOWN_TIMEOUT: '5'
		});
	});

	it.each(['0', '65536', '-1', '30.5', 'http'])('refuses the port %s by its name', (port) => {
		expect(() => settingsOf({ FAKE_MAIL_PORT: port }, { demo: true })).toThrow(
			`FAKE_MAIL_PORT is '${port}': it must be a whole number from 1 to 65535.`
		);
	});
});
