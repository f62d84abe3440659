import { expect, it } from 'vitest';
import { kilogramsOf, sternalAdvice, sternalBans, type SternalGrade } from './sternum';

// Scale: El-Ansary 2018 (doi 10.15344/2455-7498/2018/140); what follows is from memory.
it.each<[SternalGrade, boolean, boolean, boolean]>([
	[0, false, false, false],
	[0, true, true, false],
	[1, false, true, false],
	[2, false, true, true],
	[3, false, true, true]
])('grade %d, a new sign %s: tell the surgeon %s, stop the arms %s', (grade, sign, tellSurgeon, stopArms) => {
	expect(sternalAdvice(grade, sign)).toEqual({ tellSurgeon, stopArms });
});

// Computed; the loads are those of published leaflets (Healthline; Mary Washington Healthcare).
it.each([
	[5, 2.27],
	[8, 3.63],
	[10, 4.54]
])('%d lb are %d kg', (pounds, kilograms) => {
	expect(kilogramsOf(pounds)).toBeCloseTo(kilograms, 2);
});

// Common practice, no published source.
it.each([
	[undefined, 'Lifting either arm above the height allowed.', 'Lifting more than the load allowed.'],
	[
		{ maxElevationDeg: 45, maxLoadKg: null },
		'Lifting either arm above 45 degrees.',
		'Lifting any load: none is stated as allowed.'
	],
	[
		{ maxElevationDeg: 70, maxLoadKg: 2.5 },
		'Lifting either arm above 70 degrees.',
		'Lifting more than 2.5 kg.'
	]
])('with %j the precautions forbid: %s %s', (allowed, height, load) => {
	const bans = sternalBans(allowed);
	expect([bans[2], bans[6]]).toEqual([height, load]);
	expect(bans).toHaveLength(7);
});
