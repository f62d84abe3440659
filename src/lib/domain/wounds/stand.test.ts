import { describe, expect, it } from 'vitest';
import { notesThatStand, standingWound } from './stand';
import type { WoundNote } from './views';

const note = (at: string, by: string, parts: Partial<WoundNote>): WoundNote => ({
	at,
	by,
	wound: null,
	sternum: null,
	note: null,
	...parts
});
const MOVES = note('2026-03-03T09:00:00.000Z', 'Ivo', { wound: 'weeping', sternum: 'moves' });
const DRY = note('2026-03-03T09:30:00.000Z', 'Nora', { wound: 'dry' });
const WORDS = note('2026-03-03T10:00:00.000Z', 'Hilde', { note: 'Dressing off.' });

describe('what holds after several notes', () => {
	it('is nothing after none', () => {
		expect(standingWound([])).toBeNull();
	});

	it('keeps the breastbone that nobody has felt since, and the newest of each part', () => {
		expect(standingWound([WORDS, DRY, MOVES])).toEqual({
			at: WORDS.at,
			by: 'Hilde',
			wound: 'dry',
			sternum: 'moves',
			note: 'Dressing off.',
			noted: {
				wound: { at: DRY.at, by: 'Nora' },
				sternum: { at: MOVES.at, by: 'Ivo' },
				note: { at: WORDS.at, by: 'Hilde' }
			}
		});
	});

	it('takes a breastbone back by feeling it again', () => {
		const stable = note('2026-03-04T09:00:00.000Z', 'Ivo', { sternum: 'stable' });
		expect(standingWound([stable, DRY, MOVES])).toMatchObject({ wound: 'dry', sternum: 'stable' });
	});
});

describe('the notes that hold', () => {
	it('are told each with who noted what, newest first, and without what is superseded', () => {
		const stand = standingWound([WORDS, DRY, MOVES]);
		expect(stand && notesThatStand(stand)).toEqual([
			WORDS,
			DRY,
			note(MOVES.at, MOVES.by, { sternum: 'moves' })
		]);
	});

	it('are one where one person noted all at once, also as it was stored before parts were kept', () => {
		const whole = { ...MOVES, note: 'Redness.' };
		expect(notesThatStand(whole)).toEqual([whole]);
		const stand = standingWound([whole]);
		expect(stand && notesThatStand(stand)).toEqual([whole]);
	});
});
