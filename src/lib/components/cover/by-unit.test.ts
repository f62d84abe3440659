import { describe, expect, it } from 'vitest';
import { coverByUnit, gapsIn, type CoverShift } from './by-unit';

const NOW = 1_000;
const UNITS = [
	{ id: 'u1', name: 'Heron Unit' },
	{ id: 'u2', name: 'Tern Ward' }
];
const SHIFTS: CoverShift[] = [
	{ unitId: 'u1', post: 'nurse', name: 'R. Ferris', until: 2_000 },
	{ unitId: 'u1', post: 'nurse', name: 'P. Adair', until: 1_001 },
	{ unitId: 'u1', post: 'surgeon', name: 'H. Castellane', until: 2_000 },
	{ unitId: 'u2', post: 'physician', name: 'M. Osei', until: 1_000 },
	{ unitId: 'elsewhere', post: 'nurse', name: 'Somebody', until: 2_000 }
];

describe('coverByUnit', () => {
	const shown = coverByUnit(UNITS, SHIFTS, NOW);

	it('has every post of every unit, in the order of the chain', () => {
		expect(shown.map(({ name, posts }) => [name, posts.map(({ post }) => post)])).toEqual(
			UNITS.map(({ name }) => [name, ['nurse', 'nurse-in-charge', 'physician', 'surgeon']])
		);
	});

	it('names all who share a post, and nobody whose shift has ended', () => {
		const names = shown.map(({ posts }) => posts.map(({ people }) => people.map(({ name }) => name)));
		expect(names).toEqual([
			[['R. Ferris', 'P. Adair'], [], [], ['H. Castellane']],
			[[], [], [], []]
		]);
	});

	it('counts the posts without anybody', () => {
		expect(gapsIn(shown)).toBe(6);
		expect(gapsIn(coverByUnit(UNITS, SHIFTS, NOW - 1))).toBe(5);
		expect(gapsIn([])).toBe(0);
	});
});
