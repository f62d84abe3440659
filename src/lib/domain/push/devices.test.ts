import { describe, expect, it } from 'vitest';
import { deviceKind, isAllowedEndpoint } from './devices';

describe('an endpoint', () => {
	const hosts = ['push.example', '127.0.0.1:3001'];

	it.each(['https://push.example/to/1', 'https://push.example:443/', 'https://127.0.0.1:3001/push/to/a'])(
		'%s may be written to',
		(endpoint) => expect(isAllowedEndpoint(endpoint, hosts)).toBe(true)
	);

	it.each([
		'http://push.example/to/1',
		'https://push.example:8443/to/1',
		'https://a.push.example/to/1',
		'https://push.example.evil.example/to/1',
		'https://push.example@evil.example/',
		'https://name@push.example/',
		'https://127.0.0.1/',
		'https://127.0.0.1:3000/',
		'https://169.254.169.254/latest',
		'https://[::1]:3001/',
		'file:///etc/passwd',
		'push.example',
		''
	])('%s may not', (endpoint) => expect(isAllowedEndpoint(endpoint, hosts)).toBe(false));
});

describe('a browser', () => {
	it.each([
		['Mozilla/5.0 (iPhone; CPU iPhone OS 17_0 like Mac OS X) Mobile/15E148', 'phone'],
		['Mozilla/5.0 (Linux; Android 14) Chrome/130 Mobile Safari/537.36', 'phone'],
		['Mozilla/5.0 (Linux; Android 14) Chrome/130 Safari/537.36', 'tablet'],
		['Mozilla/5.0 (iPad; CPU OS 16_0 like Mac OS X)', 'tablet'],
		['Mozilla/5.0 (X11; Linux x86_64) Chrome/130', 'computer'],
		[null, 'computer']
	] as const)('%s runs on a %s', (agent, kind) => expect(deviceKind(agent)).toBe(kind));
});
