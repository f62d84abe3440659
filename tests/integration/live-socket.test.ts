import { createServer, type Server, type ServerResponse } from 'node:http';
import { connect, type AddressInfo, type Socket } from 'node:net';
import { setImmediate as turn } from 'node:timers/promises';
import { setResponse } from '@sveltejs/kit/node';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { dropConnection } from '$lib/server/live/connection';
import { guardedStream, type Sink } from '$lib/server/live/guarded';
import { cutReaders } from '$lib/server/live/pipe';

/** One open stream as the server sees it. */
interface Stream {
	sink: Sink;
	response: ServerResponse;
}

let server: Server;
let streams: Stream[];
let clients: Socket[];

beforeEach(async () => {
	streams = [];
	clients = [];
	// What the adapter does with a request, without the product around it.
	server = createServer((request, response) => {
		const start = (sink: Sink) => {
			streams.push({ sink, response });
			return () => {};
		};
		const options = { dropConnection: () => dropConnection(request) };
		void setResponse(
			response,
			guardedStream(start, () => Promise.resolve(true), options)
		);
	});
	await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
});
afterEach(async () => {
	clients.forEach((client) => client.destroy());
	server.closeAllConnections();
	await new Promise((resolve) => server.close(resolve));
});

async function eventually(holds: () => boolean): Promise<void> {
	while (!holds()) {
		await turn();
	}
}

/** Ask for a stream; a reader that does not read leaves what comes in the socket. */
async function open({ reads }: { reads: boolean }): Promise<Stream & { client: Socket; text: () => string }> {
	const { port } = server.address() as AddressInfo;
	const client = connect(port, '127.0.0.1').on('error', () => {});
	clients.push(client);
	let text = '';
	if (reads) {
		client.setEncoding('utf8').on('data', (part: string) => (text += part));
	} else {
		client.pause();
	}
	client.write('GET / HTTP/1.1\r\nHost: test\r\n\r\n');
	const before = streams.length;
	await eventually(() => streams.length > before);
	const stream = streams.at(-1);
	if (!stream) {
		throw new Error('No stream was opened.');
	}
	return { ...stream, client, text: () => text };
}

const change = (cursor: number) =>
	({ kind: 'change', cursor, event: { topic: 'thread', kind: 'entry', id: 'x', episodeId: null } }) as const;

/** Send to all, as fast as a reader that reads can follow, until something holds; gives how many were sent. */
async function sendUntil(holds: () => boolean, ...sinks: Sink[]): Promise<number> {
	let sent = 0;
	while (!holds()) {
		sent += 1;
		sinks.forEach((sink) => sink.send(change(sent)));
		await (sent % 100 === 0 ? turn() : null);
	}
	return sent;
}

/** A connection that was reset lets nothing be written to it; one that is merely idle does. */
async function isReset(client: Socket): Promise<void> {
	while (!client.destroyed) {
		client.write('\r\n');
		await turn();
	}
}

describe('a client that stops reading', () => {
	it('is cut while it does not read, and others hear everything', async () => {
		const stalled = await open({ reads: false });
		const other = await open({ reads: true });
		const before = cutReaders();
		const sent = await sendUntil(() => cutReaders() > before, stalled.sink, other.sink);
		await isReset(stalled.client);
		expect(stalled.client.bytesRead).toBe(0);
		expect(stalled.response.destroyed).toBe(true);
		await eventually(() => other.text().includes(`id: ${sent}\n`));
		expect(other.text().match(/^event: change$/gm)).toHaveLength(sent);
		expect(cutReaders() - before).toBe(1);
	});

	it('loses its connection soon after the stream has ended, with all that waits', async () => {
		const stalled = await open({ reads: false });
		// The socket takes nothing for twenty turns of the event loop, and less waits than what gets a reader cut.
		let full = 0;
		const stuck = () => (full = stalled.response.writableNeedDrain ? full + 1 : 0) === 2_000;
		await sendUntil(stuck, stalled.sink);
		const before = cutReaders();
		stalled.sink.end();
		await isReset(stalled.client);
		expect([stalled.response.writableFinished, cutReaders() - before]).toEqual([false, 0]);
		expect(stalled.client.bytesRead).toBe(0);
	});
});

describe('a client that reads', () => {
	it('gets the whole of a stream that ends, and its connection is closed with it', async () => {
		const reading = await open({ reads: true });
		const closed = new Promise((resolve) => reading.client.once('close', resolve));
		const sent = await sendUntil(() => reading.text().includes('id: 500\n'), reading.sink);
		reading.sink.end();
		await closed;
		expect(reading.text().match(/^event: change$/gm)).toHaveLength(sent);
		expect(reading.text()).toMatch(/^connection: close\r$/im);
		expect(reading.response.writableFinished).toBe(true);
	});
});
