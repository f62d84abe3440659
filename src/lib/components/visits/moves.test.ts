import { describe, expect, it } from 'vitest';
import type { Role, VisitState } from '$lib/domain/core/codes';
import { offeredMoves } from './moves';

const ZONE = 'Europe/Dublin';
const VISIT = '2026-03-06T10:00:00Z';
const person = (role: Role) => ({ kind: 'person', id: 'p', name: 'P', role, unitIds: [] }) as const;

const offered = (state: VisitState, now: string, role: Role = 'coordinator') =>
	offeredMoves({ state, startsAt: VISIT }, person(role), { now: Date.parse(now), zone: ZONE }).join(' ');

describe('offeredMoves', () => {
	it.each<[VisitState, string, string]>([
		['planned', '2026-03-05T23:59:59Z', 'confirm cancel'],
		['planned', '2026-03-06T00:00:00Z', 'attend confirm miss cancel'],
		['planned', '2026-03-06T09:59:59Z', 'attend confirm miss cancel'],
		['planned', '2026-03-06T10:00:00Z', 'attend miss cancel'],
		['planned', '2026-03-06T23:59:59Z', 'attend miss cancel'],
		['planned', '2026-03-07T00:00:00Z', 'attend miss'],
		['confirmed', '2026-03-05T12:00:00Z', 'cancel'],
		['confirmed', '2026-03-06T12:00:00Z', 'attend miss cancel'],
		['attended', '2026-03-06T12:00:00Z', 'miss reopen'],
		['missed', '2026-03-07T12:00:00Z', 'attend reopen'],
		['cancelled', '2026-03-05T12:00:00Z', '']
	])('%s, at %s: %s', (state, now, moves) => {
		expect(offered(state, now)).toBe(moves);
	});

	it.each<[Role, string]>([
		['coordinator', 'attend confirm miss cancel'],
		['therapist', 'attend confirm miss cancel'],
		['nurse', 'attend miss'],
		['physician', ''],
		['surgeon', '']
	])('to a %s on the day: %s', (role, moves) => {
		expect(offered('planned', '2026-03-06T08:00:00Z', role)).toBe(moves);
	});
});
