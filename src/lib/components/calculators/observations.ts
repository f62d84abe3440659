/** The early-warning score and the figures of one blood pressure. */
import {
	earlyWarning,
	OBSERVATIONS,
	pressures,
	productBand,
	type Observation
} from '$lib/domain/calculators';
import { earlyWarningBody, pressuresBody, type EarlyWarningInput } from '$lib/domain/calculators/forms';
import { m } from '$lib/i18n/paraglide/messages';
import {
	figure,
	numbersOf,
	workOut,
	type CalculatorSpec,
	type Result,
	type Typed,
	type Worked
} from './spec';

const OBSERVATION_LABELS: Record<Observation, () => string> = {
	rr: m.calculators_rr,
	spo2: m.calculators_spo2,
	oxygen: m.calculators_oxygen,
	sbp: m.calculators_sbp,
	pulse: m.calculators_pulse,
	consciousness: m.calculators_consciousness,
	temperature: m.calculators_temperature
};
const RISK_LABELS = {
	low: m.calculators_risk_low,
	'low-medium': m.calculators_risk_low_medium,
	medium: m.calculators_risk_medium,
	high: m.calculators_risk_high
};

/** Only at rest, and on the second scale only with the name of the clinician who confirmed it. */
export const earlyWarningSpec: CalculatorSpec = {
	id: 'early-warning',
	title: m.calculators_early_warning(),
	cautions: [m.calculators_early_warning_rest(), m.calculators_early_warning_scale()],
	fields: ({ scale }) => [
		{ name: 'atRest', label: m.calculators_at_rest(), options: REST, initial: '' },
		{ name: 'rr', label: m.calculators_rr(), unit: '/min' },
		{ name: 'spo2', label: m.calculators_spo2(), unit: '%' },
		{ name: 'scale', label: m.calculators_scale(), options: SCALES, initial: '1' },
		...(scale === '2' ? [{ name: 'clinician', label: m.calculators_clinician() }] : []),
		{ name: 'oxygen', label: m.calculators_oxygen(), options: OXYGEN, initial: '' },
		{ name: 'sbp', label: m.calculators_sbp(), unit: 'mmHg' },
		{ name: 'pulse', label: m.calculators_pulse(), unit: '/min' },
		{ name: 'consciousness', label: m.calculators_consciousness(), options: CONSCIOUSNESS, initial: '' },
		{ name: 'temperature', label: m.calculators_temperature(), unit: '°C' }
	],
	work: scored
};

function scored(typed: Typed): Worked {
	const { atRest = '', clinician = '', oxygen = '', ...rest } = typed;
	if (atRest === 'no') {
		return { kind: 'faults', faults: { atRest: m.calculators_not_at_rest() } };
	}
	if (atRest === '') {
		return { kind: 'open', lacking: ['atRest'] };
	}
	if (typed.scale === '2' && clinician.trim() === '') {
		return { kind: 'open', lacking: ['clinician'] };
	}
	const body = { ...numbersOf(rest), ...(oxygen === '' ? {} : { oxygen: oxygen === 'yes' }) };
	return workOut(earlyWarningBody, body, (input) => answerOf(input, clinician.trim()));
}

function answerOf(input: EarlyWarningInput, clinician: string): Result {
	const { total, parts, missing, risk, response } = earlyWarning(input);
	const lines = OBSERVATIONS.map((each) => ({
		label: OBSERVATION_LABELS[each](),
		value: parts[each] === null ? m.calculators_missing() : `${parts[each]}`
	}));
	const head =
		total === null || risk === null
			? m.calculators_incomplete({ missing: missing.map((each) => OBSERVATION_LABELS[each]()).join(', ') })
			: m.calculators_total({ total, risk: RISK_LABELS[risk]() });
	const second = input.scale === 2 ? [m.calculators_second_scale({ name: clinician })] : [];
	return { head, lines, notes: [...(response === null ? [] : [response]), ...second] };
}

const REST = [
	{ value: '', label: m.calculators_choose() },
	{ value: 'yes', label: m.calculators_yes() },
	{ value: 'no', label: m.calculators_no() }
];
const OXYGEN = [
	{ value: '', label: m.calculators_choose() },
	{ value: 'no', label: m.calculators_on_air() },
	{ value: 'yes', label: m.calculators_on_oxygen() }
];
const SCALES = [
	{ value: '1', label: m.calculators_scale_1() },
	{ value: '2', label: m.calculators_scale_2() }
];
const CONSCIOUSNESS = [
	{ value: '', label: m.calculators_choose() },
	{ value: 'A', label: m.calculators_conscious_a() },
	{ value: 'C', label: m.calculators_conscious_c() },
	{ value: 'V', label: m.calculators_conscious_v() },
	{ value: 'P', label: m.calculators_conscious_p() },
	{ value: 'U', label: m.calculators_conscious_u() }
];

export const pressuresSpec: CalculatorSpec = {
	id: 'pressures',
	title: m.calculators_pressures(),
	cautions: [m.calculators_pressures_caution()],
	fields: () => [
		{ name: 'hr', label: m.calculators_pulse(), unit: '/min' },
		{ name: 'sbp', label: m.calculators_sbp(), unit: 'mmHg' },
		{ name: 'dbp', label: m.calculators_dbp(), unit: 'mmHg' }
	],
	work: (typed) =>
		workOut(pressuresBody, numbersOf(typed), (input) => {
			const { map, pulsePressure, ratePressureProduct, shockIndex } = pressures(input);
			const band = productBand(ratePressureProduct);
			return {
				head: m.calculators_mean({ value: figure(map, 0) }),
				lines: [
					{ label: m.calculators_pulse_pressure(), value: `${figure(pulsePressure, 0)} mmHg` },
					{
						label: m.calculators_product(),
						value: `${figure(ratePressureProduct, 0)}${band === null ? '' : ` (${band})`}`
					},
					{ label: m.calculators_shock_index(), value: figure(shockIndex, 2) }
				],
				notes: []
			};
		})
};
