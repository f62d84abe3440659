import { createServer as createTlsServer } from 'node:https';
import { createServer, type Server, type Socket } from 'node:net';
import { createFake, type Route } from './http';

/** The first byte of every TLS connection: its kind of record, a handshake. */
const HANDSHAKE = 22;

/**
 * HTTP and HTTPS on one port, over the same routes: what comes first on a connection tells them apart. So a stand-in
 * that has to speak TLS needs no port of its own.
 */
export function createBoth(routes: readonly Route[], tls: { key: string; cert: string }): Server {
	const plain = createFake(routes);
	const secure = createTlsServer(tls, (request, response) => void plain.emit('request', request, response));
	// A client that goes away in the middle of a handshake is no reason to end.
	secure.on('tlsClientError', (_error, socket) => socket.destroy());
	return createServer((socket) => {
		socket.once('error', () => socket.destroy());
		socket.once('readable', () => handOver(socket, (first) => (first === HANDSHAKE ? secure : plain)));
	});
}

function handOver(socket: Socket, choose: (first: number | undefined) => Server): void {
	const begun = socket.read() as Buffer | null;
	if (begun === null) {
		socket.destroy();
		return;
	}
	socket.unshift(begun);
	choose(begun[0]).emit('connection', socket);
}
