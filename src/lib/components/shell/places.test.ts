import { describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { coverPlace, isIn, mainPlaces, morePlaces } from './places';

const keys = (places: { key: string }[]) => places.map(({ key }) => key);

describe('the places', () => {
	it('leaves room for More among the four of a phone', () => {
		expect(ROLES.map((role) => mainPlaces(role).length)).toEqual(ROLES.map(() => 3));
	});

	it.each(ROLES)('shows accounts to an administrator alone (%s)', (role) => {
		const all = [...mainPlaces(role), ...morePlaces(role, false)];
		expect(keys(all).includes('accounts')).toBe(role === 'admin');
		expect(keys(all).includes('ward')).toBe(role !== 'admin');
		expect(new Set(keys(all)).size).toBe(all.length);
	});

	it.each([true, false])('shows the phones of the demonstration only in one (%s)', (demo) => {
		expect(keys(morePlaces('nurse', demo)).includes('phones')).toBe(demo);
	});
});

describe('isIn', () => {
	it.each([
		['/loose-ends', 'loose-ends'],
		['/escalations/018f', 'loose-ends'],
		['/ward', 'ward'],
		['/patients/018f/threads/0190', 'ward'],
		['/bedside/018f', 'ward'],
		['/visits', 'visits'],
		['/cover', 'cover']
	])('puts %s in %s and nowhere else', (path, key) => {
		const places = [...mainPlaces('nurse'), coverPlace()];
		expect(keys(places.filter((place) => isIn(place, path)))).toEqual([key]);
	});

	it.each(['/wardrobe', '/', '/bedsides'])('puts %s nowhere', (path) => {
		expect(mainPlaces('nurse').some((place) => isIn(place, path))).toBe(false);
	});
});
