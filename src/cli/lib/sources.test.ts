import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { isNoSource } from './build.mjs';
import { hashOf } from './hash.mjs';
import { fitsLock } from './install.mjs';

describe('hashOf', () => {
	let root = '';
	beforeEach(() => {
		root = mkdtempSync(path.join(tmpdir(), 'ropewalk-hash-'));
		mkdirSync(path.join(root, 'src/deep'), { recursive: true });
		writeFileSync(path.join(root, 'src/a.ts'), 'a');
		writeFileSync(path.join(root, 'src/deep/b.ts'), 'b');
	});
	afterEach(() => rmSync(root, { recursive: true, force: true }));

	const hash = () => hashOf(root, ['src', 'missing.json'], (name) => name === 'src/made');

	it('stays the same while nothing changes', () => {
		expect(hash()).toBe(hash());
	});

	it.each([
		['a changed file', 'src/a.ts', 'A'],
		['a new file', 'src/deep/c.ts', ''],
		['a file that was missing', 'missing.json', '{}']
	])('shows %s', (_what, name, content) => {
		const before = hash();
		writeFileSync(path.join(root, name), content);
		expect(hash()).not.toBe(before);
	});

	it('shows a removed file', () => {
		const before = hash();
		rmSync(path.join(root, 'src/deep/b.ts'));
		expect(hash()).not.toBe(before);
	});

	it('does not look at what is left out', () => {
		const before = hash();
		mkdirSync(path.join(root, 'src/made'));
		writeFileSync(path.join(root, 'src/made/x.ts'), 'x');
		expect(hash()).toBe(before);
	});
});

describe('isNoSource', () => {
	it.each([
		['src/lib/routes.ts', false],
		['src/lib/i18n/messages/en/common.json', false],
		['src/lib/i18n/paraglide', true],
		['src/cli', true],
		['src/fakes', true],
		['src/lib/domain/core/time.test.ts', true]
	])('%s: %s', (name, isNot) => {
		expect(isNoSource(name)).toBe(isNot);
	});
});

describe('fitsLock', () => {
	const a = { version: '1.0.0', integrity: 'sha512-a' };
	const forElsewhere = { version: '2.0.0', integrity: 'sha512-b', optional: true };
	const lock = { packages: { '': {}, 'node_modules/a': a, 'node_modules/b': forElsewhere } };

	it.each([
		['what is locked is there', { packages: { 'node_modules/a': a } }, true],
		[
			'an optional one is there too',
			{ packages: { 'node_modules/a': a, 'node_modules/b': forElsewhere } },
			true
		],
		['one is missing', { packages: {} }, false],
		['one has another version', { packages: { 'node_modules/a': { ...a, version: '1.0.1' } } }, false],
		['one has other contents', { packages: { 'node_modules/a': { ...a, integrity: 'sha512-x' } } }, false],
		['nothing is installed', null, false]
	])('when %s', (_what, installed, fits) => {
		expect(fitsLock(lock, installed)).toBe(fits);
	});
});
