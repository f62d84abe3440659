import type { RequestEvent } from '@sveltejs/kit';
import { beforeEach, describe, expect, it, vi } from 'vitest';

const { warn } = vi.hoisted(() => ({ warn: vi.fn() }));
vi.mock('../log', () => ({ log: () => ({ warn }) }));

type Asked = Pick<RequestEvent, 'getClientAddress' | 'platform'>;

function asked(named: string | Error, socket?: string): Asked {
	const getClientAddress = () => {
		if (named instanceof Error) {
			throw named;
		}
		return named;
	};
	const platform = socket === undefined ? undefined : { req: { socket: { remoteAddress: socket } } };
	return { getClientAddress, platform } as unknown as Asked;
}

const ABSENT = new Error('Address header was specified but is absent from request');

beforeEach(() => {
	warn.mockClear();
	vi.resetModules();
});

describe('the address of a caller', () => {
	it.each([
		['the one that the header names', asked('192.0.2.7', '10.0.0.1'), '192.0.2.7'],
		['one of the newer kind', asked('2001:db8::7', '10.0.0.1'), '2001:db8::7'],
		['the connection’s without the header', asked(ABSENT, '10.0.0.1'), '10.0.0.1'],
		['the connection’s when the header is empty', asked('', '10.0.0.1'), '10.0.0.1'],
		['the connection’s when the header holds no address', asked('<b>me</b>', '10.0.0.1'), '10.0.0.1'],
		['unknown where there is no connection either', asked(ABSENT), null]
	])('is %s', async (_, event, address) => {
		const { clientAddress } = await import('./address');
		expect(clientAddress(event)).toBe(address);
	});

	it('is missed aloud once, not for every health check', async () => {
		const { clientAddress } = await import('./address');
		clientAddress(asked(ABSENT, '10.0.0.1'));
		clientAddress(asked(ABSENT, '10.0.0.1'));
		expect(warn).toHaveBeenCalledTimes(1);
	});
});
