import { afterEach, describe, expect, it, vi } from 'vitest';
import type { LooseEnd, LooseEndKind } from '$lib/domain/loose-ends/loose-ends';
import { answerOf, endedSince } from './answers';

const end = (kind: LooseEndKind, id = 'a', threadId: string | null = 't') =>
	({ kind, id, threadId, title: 'Arm stage' }) as LooseEnd;

afterEach(() => vi.unstubAllGlobals());

function answering(status: number, body: unknown) {
	const fetched = vi.fn(() => Promise.resolve(Response.json(body, { status })));
	vi.stubGlobal('fetch', fetched);
	return fetched;
}

describe('endedSince', () => {
	it.each<[LooseEndKind, boolean]>([
		['clearance', true],
		['clearance-question', true],
		['referral', true],
		['mention', true],
		['escalation', false],
		['recheck', false]
	])('of a %s that is gone: %s', (kind, told) => {
		expect(endedSince([end(kind)], [])).toHaveLength(told ? 1 : 0);
	});

	it('leaves what is open alone, also under another kind with the same id', () => {
		expect(endedSince([end('clearance')], [end('clearance')])).toEqual([]);
		expect(endedSince([end('clearance')], [end('referral')])).toHaveLength(1);
	});
});

describe('answerOf', () => {
	it('names who decided a clearance', async () => {
		const fetched = answering(200, { decidedBy: 'H. Castellane' });
		expect((await answerOf(end('clearance', 'c1'))).by).toBe('H. Castellane');
		expect(fetched).toHaveBeenCalledWith('/api/clearances/c1', expect.anything());
	});

	it.each<[LooseEndKind, string]>([
		['referral', 'I. Aldous'],
		['mention', 'R. Ferris']
	])('names who answered a %s: %s', async (kind, name) => {
		answering(200, {
			referral: { decidedBy: { name: 'I. Aldous' } },
			items: [{ author: { name: 'R. Ferris' } }]
		});
		expect((await answerOf(end(kind))).by).toBe(name);
	});

	it('names nobody where the record gives no answer', async () => {
		answering(404, { type: 'not-found' });
		expect((await answerOf(end('clearance'))).by).toBeNull();
		expect((await answerOf(end('mention', 'm', null))).by).toBeNull();
	});
});
