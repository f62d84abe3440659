import { sternalAdvice, type SternalAdvice, type SternalGrade } from '../bedside/sternum';
import type { SternumFinding } from './codes';
import type { WoundNote } from './views';

/** Where a finding of the hand lies on the stability scale: from memory, needs local consent. */
const GRADE: Record<SternumFinding, SternalGrade> = { stable: 0, click: 1, moves: 2 };

/** What follows from a note: a breastbone that clicks or moves, a wound that weeps or is open, is told today. */
export function woundAdvice({ wound, sternum }: Pick<WoundNote, 'wound' | 'sternum'>): SternalAdvice {
	return sternalAdvice(sternum === null ? 0 : GRADE[sternum], wound === 'weeping' || wound === 'open');
}
