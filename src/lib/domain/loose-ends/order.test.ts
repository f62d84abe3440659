import { describe, expect, it } from 'vitest';
import type { Grade, Priority } from '../core/codes';
import { LOOSE_END_KINDS, type LooseEndKind } from './loose-ends';
import { byUrgency, rank } from './order';

interface Named {
	kind: LooseEndKind;
	grade?: Grade;
	priority?: Priority;
	since?: number;
	due?: number;
	id?: string;
}

const thing = ({ kind, grade, priority, since = 0, due, id = 'x' }: Named) => ({
	kind,
	id,
	grade: grade ?? null,
	priority: priority ?? null,
	since,
	due: due ?? null
});

/** Every rung, the most urgent first; the ones further down are older, so that age alone would turn it round. */
const LADDER: Named[] = [
	{ kind: 'escalation', grade: 'high' },
	{ kind: 'escalation', grade: 'medium' },
	{ kind: 'escalation', grade: 'low' },
	{ kind: 'arrival', grade: 'high' },
	{ kind: 'confirm', grade: 'medium' },
	{ kind: 'escalation-taken', grade: 'high' },
	{ kind: 'escalation-taken', grade: 'medium' },
	{ kind: 'escalation-taken', grade: 'low' },
	{ kind: 'recheck' },
	{ kind: 'physician-to-tell' },
	{ kind: 'referral', priority: 'urgent' },
	{ kind: 'referral', priority: 'soon' },
	{ kind: 'referral', priority: 'routine' },
	{ kind: 'message-failed' },
	{ kind: 'visit-cancelled' }
];

describe('the order of loose ends', () => {
	it('goes by kind, then grade or priority, whatever the age', () => {
		const aged = LADDER.map((named, index) => thing({ ...named, since: -index, id: String(index) }));
		expect(aged.toReversed().toSorted(byUrgency)).toEqual(aged);
	});

	it.each<[string, Named, Named]>([
		[
			'the older escalation',
			{ kind: 'escalation', grade: 'high', since: 1 },
			{ kind: 'escalation', grade: 'high', since: 2 }
		],
		[
			'the older escalation, though the other is needed sooner',
			{ kind: 'escalation', grade: 'high', since: 1, due: 9 },
			{ kind: 'escalation', grade: 'high', since: 2, due: 3 }
		],
		[
			'the older of a clearance and a question',
			{ kind: 'mention', since: 1 },
			{ kind: 'clearance', since: 2 }
		],
		[
			'a clearance before a routine referral',
			{ kind: 'clearance', since: 2 },
			{ kind: 'referral', priority: 'routine', since: 1 }
		],
		[
			'an urgent referral before a clearance',
			{ kind: 'referral', priority: 'urgent', since: 2 },
			{ kind: 'clearance', since: 1 }
		],
		[
			'the re-check that is due first',
			{ kind: 'recheck', since: 2, due: 3 },
			{ kind: 'recheck', since: 1, due: 4 }
		],
		[
			'the visit that comes first',
			{ kind: 'visit-unconfirmed', since: 2, due: 3 },
			{ kind: 'visit-cancelled', since: 1, due: 4 }
		],
		[
			'the smaller identifier of two that are equal',
			{ kind: 'inbound', id: 'a' },
			{ kind: 'inbound', id: 'b' }
		]
	])('has %s first', (_, first, second) => {
		const pair = [thing(first), thing(second)];
		expect(pair.toReversed().toSorted(byUrgency)).toEqual(pair);
	});

	it('does not read what somebody wrote', () => {
		const asked = { ...thing({ kind: 'clearance' }), text: 'urgent' };
		expect(rank(asked)).toBe(rank(thing({ kind: 'clearance' })));
	});

	it.each(LOOSE_END_KINDS)('%s has a place', (kind) => {
		expect(rank(thing({ kind }))).toBeGreaterThanOrEqual(0);
	});
});
