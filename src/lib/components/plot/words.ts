import { m } from '$lib/i18n/paraglide/messages';
import type { PlotPoint, PlotSeries } from './plot';

/** What the rules made of a point, in a word; nothing when they found nothing. */
export function verdictWord(verdict: PlotPoint['verdict']): string {
	if (verdict === 'stop') {
		return m.common_plot_stop();
	}
	return verdict === 'caution' ? m.common_plot_caution() : '';
}

/** A point read aloud: `Systolic 108 mmHg, Tue 1 Dec 10:40 after, stop`. */
export function pointWords(series: Pick<PlotSeries, 'label'>, point: PlotPoint, unit: string): string {
	const verdict = verdictWord(point.verdict);
	return [`${series.label} ${point.y} ${unit}`, point.moment, ...(verdict ? [verdict] : [])].join(', ');
}
