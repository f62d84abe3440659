import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

let folder: string;

beforeEach(() => {
	folder = mkdtempSync(path.join(tmpdir(), 'ropewalk-links-'));
	vi.stubEnv('DATA_DIR', folder);
});

afterEach(() => {
	vi.unstubAllEnvs();
	rmSync(folder, { recursive: true, force: true });
});

/** A process that has just started: the modules hold neither environment nor key yet. */
async function freshStart() {
	vi.resetModules();
	return import('./links');
}

describe('the token of a link', () => {
	it('is 22 characters that a URL carries unchanged, and differs from link to link', async () => {
		const { linkToken } = await freshStart();
		expect(linkToken('a')).toMatch(/^[\w-]{22}$/);
		expect(linkToken('a')).toBe(linkToken('a'));
		expect(linkToken('a')).not.toBe(linkToken('b'));
	});

	it('is the same after a restart, from a key that only the owner may read', async () => {
		const before = (await freshStart()).linkToken('a');
		const file = path.join(folder, 'link.key');
		expect(readFileSync(file)).toHaveLength(32);
		expect(statSync(file).mode & 0o777).toBe(0o600);
		expect((await freshStart()).linkToken('a')).toBe(before);
	});

	it('follows the configured secret where there is one', async () => {
		// HMAC-SHA256 computed with OpenSSL: printf a | openssl dgst -sha256 -hmac <32 times 'k'> -binary | basenc --base64url
		vi.stubEnv('LINK_SECRET', 'k'.repeat(32));
		const { linkToken } = await freshStart();
		expect(linkToken('a')).toBe('2L0VNypDtMX_4XKb7E7WTM');
		expect(() => statSync(path.join(folder, 'link.key'))).toThrow();
	});

	it('is not made from a damaged key', async () => {
		writeFileSync(path.join(folder, 'link.key'), 'short');
		const { linkToken } = await freshStart();
		expect(() => linkToken('a')).toThrow('has 5 bytes, not 32');
	});
});

describe('the digest of a token', () => {
	it('is SHA-256 in hexadecimal', async () => {
		const { linkDigest } = await freshStart();
		// FIPS 180-2, appendix B.1: the message 'abc'.
		expect(linkDigest('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
	});
});
