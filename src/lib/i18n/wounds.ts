import type { SternumFinding, WoundFinding } from '../domain/wounds/codes';
import type { WoundNote } from '../domain/wounds/views';
import { m } from './paraglide/messages';

export const WOUND_WORDS: Record<WoundFinding, () => string> = {
	dry: m.wounds_wound_dry,
	moist: m.wounds_wound_moist,
	weeping: m.wounds_wound_weeping,
	open: m.wounds_wound_open
};

export const STERNUM_WORDS: Record<SternumFinding, () => string> = {
	stable: m.wounds_sternum_stable,
	click: m.wounds_sternum_click,
	moves: m.wounds_sternum_moves
};

/** The same where the heading names the part. */
export const WOUND_CHOICES: Record<WoundFinding, () => string> = {
	dry: m.wounds_choice_dry,
	moist: m.wounds_choice_moist,
	weeping: m.wounds_choice_weeping,
	open: m.wounds_choice_open
};
export const STERNUM_CHOICES: Record<SternumFinding, () => string> = {
	stable: m.wounds_choice_stable,
	click: m.wounds_choice_click,
	moves: m.wounds_choice_moves
};

/** What was noted, in one line: wound, breastbone, words. */
export function woundWords({ wound, sternum, note }: Pick<WoundNote, 'wound' | 'sternum' | 'note'>): string {
	return [wound && WOUND_WORDS[wound](), sternum && STERNUM_WORDS[sternum](), note]
		.filter(Boolean)
		.join(' · ');
}
