import { mayHold } from '$lib/domain/episodes/precautions';
import type { EpisodeListItem } from '$lib/domain/episodes/views';
import type { Reader } from '$lib/format';
import { linesWords, oxygenWords } from '$lib/i18n/lines';
import { m } from '$lib/i18n/paraglide/messages';
import { byMouthWords } from '../patient/by-mouth';
import { bewareWords, dayWords } from '../patient/words';
import { DOT } from '$lib/format';

/** How long ago and what was operated: `day 4 · Bypass`. The day first, because a round goes by it. */
export function procedureWords(
	item: Pick<EpisodeListItem, 'procedure' | 'operatedAt'>,
	reader: Reader
): string {
	return [dayWords(item, reader), item.procedure].filter(Boolean).join(DOT);
}

/** That nothing goes by mouth, precautions, the drug that slows the heart, oxygen, and lines where there are any. What nobody knows of drug and oxygen is said: a drug is then judged as given. */
export function wardBeware(
	item: Pick<EpisodeListItem, 'precautions' | 'betaBlocked' | 'nothingByMouth' | 'lines' | 'oxygen'>,
	reader: Reader
): string[] {
	const { precautions, betaBlocked } = item;
	const drug = { true: m.patient_drug_yes, false: null, null: m.patient_drug_unknown }[`${betaBlocked}`];
	return [
		...byMouthWords(item),
		...(mayHold(precautions) ? bewareWords(precautions, reader) : []),
		...(drug === null ? [] : [drug()]),
		...[oxygenWords(item.oxygen), linesWords(item.lines)].filter(Boolean)
	];
}
