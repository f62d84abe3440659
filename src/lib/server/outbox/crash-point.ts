import { existsSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { env } from '../env';
import type { Sent } from './channels/channel';

/**
 * In tests alone: the process is killed between the gateway's yes and our record of it, the one moment in which a message
 * is out and nobody here knows. Once for each data folder, so that the next start goes on from there.
 */
export function crashWhereAsked({ outcome }: Sent): void {
	if (!env().testCrash || outcome.kind !== 'accepted') {
		return;
	}
	const done = path.join(env().dataDir, 'crashed');
	if (!existsSync(done)) {
		writeFileSync(done, '');
		process.kill(process.pid, 'SIGKILL');
	}
}
