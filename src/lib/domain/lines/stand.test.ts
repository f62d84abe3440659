import { describe, expect, it } from 'vitest';
import { inListOrder, standingOxygen } from './stand';

const said = (at: number, lpm: number) => ({ at, lpm, by: 'Nora' });

describe('the oxygen that stands', () => {
	it('is unknown where nobody has said anything', () => {
		expect(standingOxygen([])).toBeNull();
	});

	it.each([
		['a reading after a note', [said(10, 4), said(20, 2)], 2],
		['a note after a reading, whichever comes first', [said(20, 2), said(10, 4)], 2],
		['none, which is said too', [said(30, 0), said(20, 2)], 0],
		['the first of two of the same instant', [said(20, 3), said(20, 2)], 3]
	])('is that of the latest instant: %s', (_, all, lpm) => {
		expect(standingOxygen(all)?.lpm).toBe(lpm);
	});
});

it('lists lines from the airway down, each once, however they were noted', () => {
	expect(inListOrder(['urinary-catheter', 'chest-drain', 'endotracheal-tube', 'chest-drain'])).toEqual([
		'endotracheal-tube',
		'chest-drain',
		'urinary-catheter'
	]);
});
