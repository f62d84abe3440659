import type { IncomingMessage } from 'node:http';

/**
 * Take the connection of a request away at once, whatever is still to be written on it; harmless when it is gone.
 * A reader that does not read does not see an end either, which stands behind what waits in the socket. So a
 * connection is reset where it can be; a local socket of the file system is only closed.
 *
 * @param request as Node has it; undefined where no built server hands it over, in development
 */
export function dropConnection(request: IncomingMessage | undefined): void {
	const socket = request?.socket;
	if (!socket || socket.destroyed) {
		return;
	}
	if (socket.remoteFamily) {
		socket.resetAndDestroy();
	} else {
		socket.destroy();
	}
}
