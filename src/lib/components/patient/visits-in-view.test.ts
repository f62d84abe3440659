import { describe, expect, it } from 'vitest';
import type { BoardVisit } from '$lib/domain/episodes/views';
import { visitsInView } from './visits-in-view';

const at = (startsAt: string): BoardVisit => ({
	closedDay: null,
	id: startsAt,
	startsAt,
	minutes: 45,
	place: 'East Gym',
	state: 'planned'
});
const days = (...of: number[]) => of.map((day) => at(`2026-03-0${day}T10:00:00.000Z`));
const shown = (visits: BoardVisit[], now: string) =>
	visitsInView(visits, Date.parse(now)).map(({ startsAt }) => Number(startsAt.slice(8, 10)));

describe('visitsInView', () => {
	it.each([
		['2026-03-01T00:00:00Z', [1, 2, 3, 4]],
		['2026-03-01T10:44:59Z', [1, 2, 3, 4]],
		['2026-03-01T10:45:00Z', [2, 3, 4, 5]],
		['2026-03-04T12:00:00Z', [5, 6]],
		['2026-03-09T00:00:00Z', [6, 5, 4, 3]]
	])('at %s shows those of day %j', (now, expected) => {
		expect(shown(days(4, 1, 6, 2, 5, 3), now)).toEqual(expected);
	});

	it('shows nothing of nothing', () => {
		expect(visitsInView([], 0)).toEqual([]);
	});
});
