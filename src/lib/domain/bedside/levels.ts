/**
 * The six in-hospital levels and their energy bands. A band includes its lower end and not its upper, except the
 * last, which includes 5: shared edges are ambiguous in print, and this is our choice. The bands themselves are
 * from memory (textbook step programmes) and are marked so.
 */
import { LEVELS, type Level } from '../core/codes';
import type { SourceId } from './limits/sources';

export interface LevelBand {
	readonly level: Level;
	/** METs, included. */
	readonly from: number;
	/** METs, not included below level 6. */
	readonly to: number;
	readonly gist: string;
}

export const LEVEL_BANDS: Readonly<Record<Level, LevelBand>> = {
	1: { level: 1, from: 1, to: 1.5, gist: 'In bed and on its edge: breathing, coughing, ankles and legs.' },
	2: { level: 2, from: 1.5, to: 2, gist: 'In the chair, up on the feet, a few steps round the bed.' },
	3: { level: 3, from: 2, to: 2.5, gist: 'About the room, washing at the basin, warming up on the feet.' },
	4: { level: 4, from: 2.5, to: 3, gist: 'Short walks in the corridor, exercise on the feet.' },
	5: { level: 5, from: 3, to: 4, gist: 'Longer walks in the corridor, arms once they are cleared.' },
	6: { level: 6, from: 4, to: 5, gist: 'One flight of stairs with a helper, ready for home.' }
};

export const LEVEL_BANDS_SOURCE: SourceId = 'level-bands';

/** The METs that daily life at home asks for: the patient's goal beyond level 6. Common practice. */
export const DAILY_LIFE_METS = [6, 8] as const;

/** Where an energy demand belongs. */
export type LevelForMets =
	| { readonly kind: 'level'; readonly level: Level }
	| { readonly kind: 'below-table' }
	| { readonly kind: 'above-table' };

/** The level whose band an energy demand in METs falls into. */
export function levelForMets(mets: number): LevelForMets {
	if (mets < LEVEL_BANDS[1].from) {
		return { kind: 'below-table' };
	}
	const level = LEVELS.find((candidate) => mets < LEVEL_BANDS[candidate].to);
	if (level !== undefined) {
		return { kind: 'level', level };
	}
	return mets === LEVEL_BANDS[6].to ? { kind: 'level', level: 6 } : { kind: 'above-table' };
}
