import { vi } from 'vitest';

/**
 * Before each test file: the environment as it was at the start, and the product's modules to be loaded anew, with
 * the settings, the clock and the key they keep. The packages stay loaded: a process of its own for each file loaded
 * them again each time, which took more than the tests.
 */
const held = globalThis as typeof globalThis & { __firstEnvironment?: NodeJS.ProcessEnv };
held.__firstEnvironment ??= { ...process.env };

for (const name of Object.keys(process.env)) {
	delete process.env[name];
}
Object.assign(process.env, held.__firstEnvironment);
vi.resetModules();
