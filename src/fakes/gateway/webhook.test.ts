import { describe, expect, it } from 'vitest';
import { sign } from './webhook';

describe('sign', () => {
	// Check values: the worked examples of the SDK vendor's page on webhook security, token '12345'.
	it.each([
		['+14158675309', 'RSOYDt4T1cUTdK1PDd93/VVr8B8='],
		['+12349013030', '0/KCTR6DLpKmkAf8muzZqo1nDgQ=']
	])('gives the published signature for a call from %s', (caller, published) => {
		const fields = {
			To: '+18005551212',
			From: caller,
			Digits: '1234',
			Caller: caller,
			CallSid: 'CA1234567890ABCDE'
		};
		expect(sign('12345', 'https://mycompany.com/myapp.php?foo=1&bar=2', fields)).toBe(published);
	});
});
