import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';

/**
 * Set the environment of this test file before anything reads it: a demonstration with a data folder of its own.
 * `fresh-modules.ts` gives each test file modules and an environment of its own, so nothing leaks into another one.
 */
export function testEnvironment(more: Record<string, string> = {}): { dataDir: string; remove(): void } {
	const dataDir = mkdtempSync(path.join(tmpdir(), 'ropewalk-data-'));
	Object.assign(process.env, { DEMO: '1', DATA_DIR: dataDir, LOG_LEVEL: 'silent', ...more });
	return { dataDir, remove: () => rmSync(dataDir, { recursive: true, force: true }) };
}
