/**
 * Workers register here to be woken after a commit. The write path knows nothing about them, so that neither
 * imports the other; their own timers find the work all the same when a wake-up is missed.
 */
const workers = new Set<() => void>();

export function onCommit(wake: () => void): () => void {
	workers.add(wake);
	return () => workers.delete(wake);
}

export function wakeWorkers(): void {
	for (const wake of workers) {
		wake();
	}
}
