import { describe, expect, it } from 'vitest';
import type { VisitItem } from '$lib/domain/visits/views';
import { aheadAndPast } from './ahead';

const READER = { zone: 'Europe/Dublin', now: Date.parse('2026-03-03T09:00:00Z') };

const visit = (startsAt: string, wantsFollowUp = false) =>
	({ id: startsAt, startsAt, wantsFollowUp }) as VisitItem;
const shown = (...visits: VisitItem[]) =>
	aheadAndPast(visits, READER).map((part) => [part.title, part.visits.map(({ id }) => id.slice(5, 16))]);

describe('aheadAndPast', () => {
	it('puts the next visit first and the last of the past first', () => {
		const days = ['2026-02-27', '2026-03-02', '2026-03-04', '2026-03-06'];
		expect(shown(...days.map((day) => visit(`${day}T10:00:00Z`)))).toEqual([
			['Ahead', ['03-04T10:00', '03-06T10:00']],
			['Past', ['03-02T10:00', '02-27T10:00']]
		]);
	});

	it.each([
		['2026-03-02T23:59:59Z', 'Past'],
		['2026-03-03T00:00:00Z', 'Ahead'],
		['2026-03-03T08:00:00Z', 'Ahead']
	])('%s is in %s: a day is over at midnight', (startsAt, title) => {
		expect(shown(visit(startsAt)).map(([name]) => name)).toEqual([title]);
	});

	it('keeps in view what waits for a new time', () => {
		expect(shown(visit('2026-02-27T10:00:00Z', true))).toEqual([['Ahead', ['02-27T10:00']]]);
	});

	it('has no part for nothing', () => {
		expect(shown()).toEqual([]);
	});
});
