import type { EpisodeListItem } from '$lib/domain/episodes/views';
import { DEFAULT_LOCALE } from '$lib/format';
import type { Sort } from '../ui/table-sort';

/** T2 stands before T10. */
const NATURAL = new Intl.Collator(DEFAULT_LOCALE, { numeric: true });

type Compare = (a: EpisodeListItem, b: EpisodeListItem) => number;

/** Who lies in a bed stands before who only comes for visits. */
const byPlace: Compare = (a, b) =>
	Number(a.bed === null) - Number(b.bed === null) ||
	NATURAL.compare(a.unit, b.unit) ||
	NATURAL.compare(a.bed ?? '', b.bed ?? '');
const byName: Compare = (a, b) => NATURAL.compare(a.patient.name, b.patient.name);

const COMPARE: Record<string, Compare> = {
	bed: byPlace,
	patient: byName,
	level: (a, b) => a.level - b.level,
	open: (a, b) => a.looseEnds - b.looseEnds
};

/** The rows in the order of a column; what is equal there stays in the order of unit, bed and name. */
export function inOrder(items: readonly EpisodeListItem[], sort: Sort | null): EpisodeListItem[] {
	const compare = COMPARE[sort?.by ?? 'bed'] ?? byPlace;
	const sign = sort?.direction === 'descending' ? -1 : 1;
	return items.toSorted((a, b) => sign * compare(a, b) || byPlace(a, b) || byName(a, b));
}
