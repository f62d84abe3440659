import type { LevelView } from '$lib/domain/levels/views';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import type { LaneEnd } from '../lane/end-words';

/** What keeps a patient from the next level, as ends that hang from the lane: those who would have to loosen it owe it. */
export function heldBack(advice: LevelView['advice']): LaneEnd[] {
	const against = advice?.reasons.filter(({ weight }) => weight === 'against').length ?? 0;
	const needs = advice?.needs ?? [];
	const kinds = needs.map((kind) => CLEARANCE_WORDS[kind]().toLowerCase()).join(', ');
	return [
		...(needs.length > 0 ? [{ strand: 'medical' as const, words: m.levels_end_needs({ kinds }) }] : []),
		...(against > 0 ? [{ strand: 'therapy' as const, words: m.levels_end_against({ count: against }) }] : [])
	];
}
