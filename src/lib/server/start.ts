import { building } from '$app/environment';
import { now } from './clock';
import { migrateDatabase } from './db/migrate';
import { closeDatabase, db, openDatabase } from './db';
import { lockData, type Lock } from './db/lock';
import { env } from './env';
import { startWork, stopWork } from './jobs/work';
import { endAllStreams } from './live/stream';
import { log } from './log';
import { prepareHospital } from './setup';
import { rederiveVisits } from './visits/rederive';
import { takeUpClock } from './setup/moved-clock';

// In development this module is evaluated anew after a change, while the process and its database live on.
const state = globalThis as typeof globalThis & { __ropewalkStarted?: Promise<void> };

/**
 * Start the server: own the data, open and migrate the database, prepare the hospital, resume the timers.
 * A start that fails stops the process: a half-started hub would look alive and hear nothing.
 */
export function startServer(): Promise<void> {
	if (building) {
		return Promise.resolve();
	}
	state.__ropewalkStarted ??= start().catch(refuseToStart);
	return state.__ropewalkStarted;
}

/** The operator reads what to do, not a stack; the cause is in the log for whoever looks further. */
function refuseToStart(error: unknown): never {
	const message = error instanceof Error ? error.message : String(error);
	process.stderr.write(`Ropewalk did not start. ${message}\n`);
	log().debug({ err: error }, 'start refused');
	process.exit(1);
}

async function start(): Promise<void> {
	const lock = lockData(env().dataDir, env().databaseUrl);
	await openDatabase(env().databaseUrl);
	await migrateDatabase(db());
	if (env().testClock) {
		await takeUpClock(env().testClockAt);
	}
	await prepareHospital();
	await rederiveVisits(now());
	startWork();
	stopOnSignal(lock);
	log().info({ demo: env().demo, url: env().publicUrl }, 'ready');
}

/**
 * End the streams first: they never become idle, and the server would wait half a minute for them. Then the
 * requests in progress finish, and the database closes when everything else is done.
 */
function stopOnSignal(lock: Lock): void {
	for (const signal of ['SIGTERM', 'SIGINT'] as const) {
		process.once(signal, () => {
			log().info({ signal }, 'stopping');
			endAllStreams();
			void stopped();
		});
	}
	process.once('sveltekit:shutdown', () => {
		void stopped().then(() => {
			closeDatabase();
			lock.release();
		});
	});
}

/** The work has stopped. A stop that fails is logged and keeps neither database nor lock open. */
async function stopped(): Promise<void> {
	try {
		await stopWork();
	} catch (error) {
		log().error({ err: error }, 'work did not stop cleanly');
	}
}
