import { Clockwork, type Job } from './clockwork';
import { cleaning } from './cleaning';

/** Everything that happens by itself, in the order in which a round does it. */
const JOBS: Job[] = [cleaning];

let clockwork: Clockwork | null = null;

export function startWork(): void {
	clockwork ??= new Clockwork(JOBS);
	clockwork.start();
}

export async function stopWork(): Promise<void> {
	await clockwork?.stop();
	clockwork = null;
}

/** Do all due work and resolve when nothing is left; used when the demonstration's clock was moved. */
export async function settleWork(): Promise<void> {
	await clockwork?.settle();
}
