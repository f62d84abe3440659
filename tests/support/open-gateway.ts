import { afterAll } from 'vitest';
import { freshDatabase } from './database';
import { testEnvironment } from './environment';
import { startGateway, type Gateway } from './gateway';
import { serveHooks, type HookServer } from './hook-server';
import { makeHospital, type Hospital } from './hospital';

/**
 * The small hospital behind the stand-in for the gateways, for one test file: what it sends goes out through the real
 * clients, and what comes back is heard by signed webhooks. All of it is taken away after the file's tests.
 */
export async function openGateway(): Promise<{ hooks: HookServer; gateway: Gateway; hospital: Hospital }> {
	const hooks = await serveHooks();
	const gateway = await startGateway(hooks.url);
	const environment = testEnvironment({ ...gateway.env, PUBLIC_URL: hooks.url });
	const database = await freshDatabase();
	afterAll(async () => {
		await gateway.stop();
		await hooks.close();
		database.close();
		environment.remove();
	});
	return { hooks, gateway, hospital: await makeHospital() };
}
