import { PLACES, type Deciding, type Help, type MayDoNow, type Place } from '$lib/domain/episodes/may-do-now';
import type { Nameboard } from '$lib/domain/episodes/views';
import { m } from '$lib/i18n/paraglide/messages';

export const PLACE_WORDS: Record<Place, () => string> = {
	bed: m.patient_place_bed,
	chair: m.patient_place_chair,
	bathroom: m.patient_place_bathroom,
	corridor: m.patient_place_corridor,
	stairs: m.patient_place_stairs
};

export const HELP_WORDS: Record<Help, () => string> = {
	alone: m.patient_help_alone,
	one: m.patient_help_one,
	two: m.patient_help_two,
	not: m.patient_help_not
};

/** Places in a row that take the same help. */
export interface MayDoGroup {
	help: Help;
	places: Place[];
}

const DECIDING_WORDS: Record<Deciding, () => string> = {
	operation: m.patient_not_known_operation,
	drug: m.patient_not_known_drug,
	rhythm: m.patient_not_known_rhythm
};

export type MayDoOf = Pick<Nameboard, 'mayDoNow' | 'notKnown' | 'phase'>;

/**
 * What a patient may do now, each part apart. What decides and is not known comes first; in the programme nothing is
 * permitted while something is missing.
 * @param brief only what takes help or is not allowed
 */
export function mayDoWords({ mayDoNow, notKnown, phase }: MayDoOf, brief = false): string[] {
	const what = notKnown.map((each) => DECIDING_WORDS[each]()).join(', ');
	if (mayDoNow !== null) {
		const groups = mayDoGroups(mayDoNow).filter(({ help }) => !brief || help !== 'alone');
		return [...(what === '' ? [] : [m.patient_not_known({ what })]), ...groups.map(groupWords)];
	}
	if (phase === 'inpatient') {
		return [m.patient_may_do_before()];
	}
	return [what === '' ? m.patient_may_do_outpatient() : m.patient_not_known_no_exercise({ what })];
}

/** What a patient may do now, from the bed to the stairs; neighbours with the same help stand together. */
export function mayDoGroups(may: MayDoNow): MayDoGroup[] {
	const groups: MayDoGroup[] = [];
	for (const place of PLACES) {
		const last = groups.at(-1);
		if (last?.help === may[place]) {
			last.places.push(place);
		} else {
			groups.push({ help: may[place], places: [place] });
		}
	}
	return groups;
}

/** `bed, chair alone`, `stairs not`. */
export function groupWords({ places, help }: MayDoGroup): string {
	return m.patient_may_do_group({
		places: places.map((place) => PLACE_WORDS[place]()).join(', '),
		help: HELP_WORDS[help]()
	});
}
