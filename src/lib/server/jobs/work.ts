import { lapseJob } from '../clearances/lapse';
import { chainJob } from '../escalations/chain-job';
import { holderJob } from '../escalations/holder-job';
import { env } from '../env';
import { openChannels } from '../outbox/channels';
import { OutboxWorker } from '../outbox/worker';
import { Clockwork, type Job } from './clockwork';
import { cleaning, signInEnds } from './cleaning';

/** Everything that happens by itself, in the order in which a round does it. */
const JOBS: Job[] = [chainJob, holderJob, lapseJob, signInEnds, cleaning];

let clockwork: Clockwork | null = null;
let outbox: OutboxWorker | null = null;

/** @throws Error when the gateways are configured in a way that cannot be used */
export function startWork(): void {
	clockwork ??= new Clockwork(JOBS);
	outbox ??= new OutboxWorker({ channels: openChannels(env()) });
	clockwork.start();
	outbox.start();
}

export async function stopWork(): Promise<void> {
	await Promise.all([clockwork?.stop(), outbox?.stop()]);
	clockwork = null;
	outbox = null;
}

/**
 * Do all due work and resolve when nothing is left; used when the demonstration's clock was moved. What the jobs
 * cause is sent, and what was sent can make more work due.
 */
export async function settleWork(): Promise<void> {
	do {
		await clockwork?.settle();
	} while (((await outbox?.settle()) ?? 0) > 0);
}
