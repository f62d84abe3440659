import { expect, it } from 'vitest';
import { kilogramsOf, sternalAdvice, type SternalGrade } from './sternum';

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
