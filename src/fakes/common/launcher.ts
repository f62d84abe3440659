/**
 * Ends this process when the one that launched it is gone, however it went: the channel between them is closed by
 * the operating system, so that even a launcher that was killed leaves nothing running. Started by hand there is
 * no channel, and the process lives until it is interrupted.
 */
export function endWithLauncher(): void {
	process.once('disconnect', () => process.exit(0));
	process.once('SIGINT', () => process.exit(0));
	process.once('SIGTERM', () => process.exit(0));
	if (process.send && !process.connected) {
		process.exit(0);
	}
}
