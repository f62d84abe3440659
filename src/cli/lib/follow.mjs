/**
 * Loaded in front of the server by its launcher. When the launcher is gone, even killed, the channel between them
 * closes, and the server ends in its usual orderly way, or soon after in any way.
 */
const FORCE_AFTER_MS = 8_000;

if (process.connected) {
	process.once('disconnect', () => {
		process.kill(process.pid, 'SIGTERM');
		setTimeout(() => process.exit(1), FORCE_AFTER_MS).unref();
	});
	// Listening to the channel must not keep a server alive that is done.
	process.channel?.unref();
}
