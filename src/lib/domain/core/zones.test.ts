import { describe, expect, it } from 'vitest';
import { isZone } from './time';
import { placeOf, zoneGroups } from './zones';

describe('placeOf', () => {
	it.each([
		['Europe/Dublin', 'Dublin'],
		['America/New_York', 'New York'],
		['America/Argentina/Buenos_Aires', 'Buenos Aires (Argentina)'],
		['UTC', 'UTC']
	])('%s is %s', (zone, place) => {
		expect(placeOf(zone)).toBe(place);
	});
});

describe('zoneGroups', () => {
	const all = zoneGroups('UTC', 'Europe/Dublin').flatMap(({ places }) => places);

	it('holds what is on record, once, also what the machine does not list', () => {
		for (const zone of ['UTC', 'Europe/Dublin', 'Australia/Lord_Howe']) {
			expect(all.filter((place) => place.zone === zone)).toHaveLength(1);
		}
	});

	it('holds nothing that is refused when it is chosen', () => {
		expect(all.filter(({ zone }) => !isZone(zone))).toEqual([]);
	});

	it('puts each place into its part of the world, in order', () => {
		const groups = zoneGroups();
		expect(groups.map(({ region }) => region)).toEqual([...groups.map(({ region }) => region)].sort());
		const europe = groups.find(({ region }) => region === 'Europe')?.places.map(({ place }) => place) ?? [];
		expect(europe).toEqual([...europe].sort());
		expect(europe).toContain('Dublin');
	});
});
