import { gunzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { compressed } from './compress';

const PAGE = '<p>One helper to the chair.</p>'.repeat(100);

function answer(type: string, headers: Record<string, string> = {}): Response {
	return new Response(PAGE, { headers: { 'content-type': type, etag: '"1"', ...headers } });
}

function asked(accepted: string | null): Request {
	return new Request('http://x.test', { headers: accepted === null ? {} : { 'accept-encoding': accepted } });
}

describe('packed for whoever takes it', () => {
	it.each([
		'text/html',
		'text/html; charset=utf-8',
		'text/calendar; charset=utf-8',
		'application/json',
		'application/problem+json'
	])('%s', async (type) => {
		const packed = compressed(asked('gzip, deflate, br, zstd'), answer(type));
		expect(packed.headers.get('content-encoding')).toBe('gzip');
		expect(packed.headers.get('vary')).toBe('accept-encoding');
		expect(packed.headers.get('etag')).toBeNull();
		const bytes = Buffer.from(await packed.arrayBuffer());
		expect(bytes.length).toBeLessThan(PAGE.length / 10);
		expect(gunzipSync(bytes).toString()).toBe(PAGE);
	});

	it('keeps the status', () => {
		const refused = new Response(PAGE, { status: 404, headers: { 'content-type': 'text/html' } });
		const packed = compressed(asked('gzip'), refused);
		expect([packed.status, packed.headers.get('content-encoding')]).toEqual([404, 'gzip']);
	});
});

describe('left as it is', () => {
	it.each([null, '', 'br', 'gzip;q=0', 'gzip; q=0.000', 'identity, gzipped'])(
		'for who asks for %s',
		async (accepted) => {
			const plain = compressed(asked(accepted), answer('text/html'));
			expect(plain.headers.get('content-encoding')).toBeNull();
			expect(plain.headers.get('vary')).toBe('accept-encoding');
			expect(await plain.text()).toBe(PAGE);
		}
	);

	it.each([
		['a stream', answer('text/event-stream')],
		['a picture', answer('image/png')],
		['what is packed already', answer('text/html', { 'content-encoding': 'br' })],
		['what knows to be short', answer('text/html', { 'content-length': '1023' })],
		['what has no body', new Response(null, { status: 303, headers: { location: '/' } })]
	])('%s', (_, response) => {
		const before = response.headers.get('content-encoding');
		expect(compressed(asked('gzip'), response)).toBe(response);
		expect(response.headers.get('content-encoding')).toBe(before);
	});

	it('takes a weight other than nothing for a yes', () => {
		const packed = compressed(asked('br;q=1.0, gzip;q=0.5'), answer('text/html'));
		expect(packed.headers.get('content-encoding')).toBe('gzip');
	});
});
