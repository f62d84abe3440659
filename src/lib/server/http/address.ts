import { isIP } from 'node:net';
import type { RequestEvent } from '@sveltejs/kit';
import { log } from '../log';

let warned = false;

/**
 * The caller's network address, or null where there is none. Behind a proxy it stands in the header that
 * `ADDRESS_HEADER` names. Kit throws when a request comes without that header, as health checks do that go past the
 * proxy, and takes whatever stands in it; then the address of the connection counts.
 */
export function clientAddress({
	getClientAddress,
	platform
}: Pick<RequestEvent, 'getClientAddress' | 'platform'>): string | null {
	const named = orNull(getClientAddress);
	if (named !== null && isIP(named) !== 0) {
		return named;
	}
	const socket = platform?.req?.socket.remoteAddress ?? null;
	if (socket !== null && !warned) {
		warned = true;
		log().warn('a request came without the address that ADDRESS_HEADER promises; the connection’s counts');
	}
	return socket;
}

function orNull(getClientAddress: () => string): string | null {
	try {
		return getClientAddress();
	} catch {
		return null;
	}
}
