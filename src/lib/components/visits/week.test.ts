import { describe, expect, it } from 'vitest';
import type { VisitItem } from '$lib/domain/visits/views';
import { weekOf } from './week';

const ZONE = 'Europe/Dublin';

describe('weekOf', () => {
	const visit = (startsAt: string) => ({ id: startsAt, startsAt }) as VisitItem;

	it('has seven days, empty ones too', () => {
		const week = weekOf('2026-03-02', [visit('2026-03-04T10:00:00Z')], ZONE);
		expect(week.map(({ date, visits }) => `${date} ${visits.length}`)).toEqual([
			'2026-03-02 0',
			'2026-03-03 0',
			'2026-03-04 1',
			'2026-03-05 0',
			'2026-03-06 0',
			'2026-03-07 0',
			'2026-03-08 0'
		]);
	});

	it('counts days by the clock of the hospital', () => {
		// 23:30 UTC in summer is half past midnight in Dublin.
		const week = weekOf('2026-06-29', [visit('2026-06-30T23:30:00Z')], ZONE);
		expect(week.filter(({ visits }) => visits.length > 0).map(({ date }) => date)).toEqual(['2026-07-01']);
	});
});
