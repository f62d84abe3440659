import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { freePorts } from '../../src/cli/lib/ports.mjs';

let product: Product;
beforeAll(async () => {
	product = await startProduct();
});
afterAll(() => product?.stop());

describe('processes', () => {
	it.each([
		['folder', () => ({ DATA_DIR: product.dataDir })],
		[
			'database, with a folder of its own,',
			() => ({
				DATA_DIR: mkdtempSync(path.join(tmpdir(), 'ropewalk-')),
				DATABASE_URL: `file:${path.join(product.dataDir, 'ropewalk.db')}`
			})
		]
	])('a second one on the same %s says so and stops', async (_, where) => {
		const [port = 0] = await freePorts(1);
		const second = spawn(process.execPath, ['build/index.js'], {
			env: { ...process.env, DEMO: '1', PORT: String(port), HOST: '127.0.0.1', ...where() },
			stdio: ['ignore', 'pipe', 'pipe']
		});
		let said = '';
		second.stderr.on('data', (chunk) => (said += String(chunk)));
		second.stdout.on('data', (chunk) => (said += String(chunk)));
		const [code] = (await once(second, 'exit')) as [number];
		expect(code).not.toBe(0);
		expect(said).toContain('Another Ropewalk process is using');
		expect((await fetch(`${product.url}/readyz`)).status).toBe(200);
	});

	it('a second copy on other ports and folders runs beside the first', async () => {
		const other = await startProduct();
		try {
			const [here, there] = await Promise.all([signInAs(product.url, 'nurse'), signInAs(other.url, 'nurse')]);
			expect((await here.get('/api/me')).status).toBe(200);
			expect((await there.get('/api/me')).status).toBe(200);
		} finally {
			await other.stop();
		}
	});

	it('a killed server keeps sign-ins and is ready again within three seconds', async () => {
		const client = await signInAs(product.url, 'nurse');
		await product.kill('SIGKILL');
		const started = performance.now();
		await product.restart();
		expect(performance.now() - started).toBeLessThan(3000);
		expect((await client.get('/api/me')).status).toBe(200);
	});
});
