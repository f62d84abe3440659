import type { Drawn } from '$lib/domain/bedside/drawn';
import type { Bar } from '$lib/domain/bedside/rules/bar';
import type { LocalDate } from '$lib/domain/core/time';
import { day, type Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

export const MEASURE_WORDS: Record<Drawn, () => string> = {
	hr: m.patient_reading_pulse,
	sbp: m.patient_reading_systolic,
	dbp: m.patient_reading_diastolic,
	spo2: m.patient_reading_saturation,
	rpe: m.patient_reading_exertion
};

export const UNIT_WORDS: Record<Drawn, () => string> = {
	hr: m.patient_unit_beats,
	sbp: m.patient_unit_pressure,
	dbp: m.patient_unit_pressure,
	spo2: m.patient_unit_saturation,
	rpe: m.patient_unit_exertion
};

export const MOMENT_WORDS: Record<'before' | 'during' | 'after', () => string> = {
	before: m.patient_reading_before,
	during: m.patient_reading_during,
	after: m.patient_reading_after
};

const BAR_WORDS = {
	stop: {
		up: [m.patient_limit_stop_over, m.patient_limit_stop_from],
		down: [m.patient_limit_stop_under, m.patient_limit_stop_down_to]
	},
	caution: {
		up: [m.patient_limit_caution_over, m.patient_limit_caution_from],
		down: [m.patient_limit_caution_under, m.patient_limit_caution_down_to]
	}
} as const;

const EDGE_WORDS = {
	stop: { up: m.patient_limit_upper_stop, down: m.patient_limit_lower_stop },
	caution: { up: m.patient_limit_upper_caution, down: m.patient_limit_lower_caution }
} as const;

/** `stop over 158` */
export function barWords({ grade, up, including, value }: Bar): string {
	return `${BAR_WORDS[grade][up ? 'up' : 'down'][including ? 1 : 0]()} ${value}`;
}

/** `upper stop`, beside a line whose height is its number. */
export function edgeWords({ grade, up }: Bar): string {
	return EDGE_WORDS[grade][up ? 'up' : 'down']();
}

/** `1 Dec`, or `1` alone: short enough to stand below a session on a phone. */
export function tickDay(date: LocalDate, withMonth: boolean, { locale }: Reader): string {
	const [dayOfMonth = '', month = ''] = day(date, locale).split(' ');
	return withMonth ? `${dayOfMonth} ${month}` : dayOfMonth;
}
