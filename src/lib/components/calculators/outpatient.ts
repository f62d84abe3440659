/** How closely an outpatient is watched in exercise. */
import { RISK_MARKS, riskClass, type RiskClass, type RiskMark } from '$lib/domain/calculators';
import { riskBody } from '$lib/domain/calculators/page-forms';
import { m } from '$lib/i18n/paraglide/messages';
import { numbersOf, workOut, type CalculatorSpec, type Typed } from './spec';

const MARKS: Record<RiskMark, () => string> = {
	'complex-arrhythmia': m.calculators_mark_arrhythmia,
	symptoms: m.calculators_mark_symptoms,
	'abnormal-haemodynamics': m.calculators_mark_haemodynamics,
	'cardiac-arrest': m.calculators_mark_arrest,
	'complicated-event': m.calculators_mark_complicated,
	'heart-failure': m.calculators_mark_failure,
	ischaemia: m.calculators_mark_ischaemia,
	depression: m.calculators_mark_depression
};
const CLASSES: Record<RiskClass, () => string> = {
	low: m.calculators_class_low,
	moderate: m.calculators_class_moderate,
	high: m.calculators_class_high
};
const ANSWERS = [
	{ value: '', label: m.calculators_choose() },
	{ value: 'no', label: m.calculators_no() },
	{ value: 'yes', label: m.calculators_yes() }
];

export const riskSpec: CalculatorSpec = {
	id: 'risk-class',
	title: m.calculators_class(),
	cautions: [m.calculators_class_caution()],
	fields: () => [
		{ name: 'ejectionFraction', label: m.calculators_ejection(), unit: '%' },
		{ name: 'mets', label: m.calculators_capacity(), unit: 'METs' },
		...RISK_MARKS.map((name) => ({ name, label: MARKS[name](), options: ANSWERS, initial: '' }))
	],
	work: (typed) =>
		workOut(riskBody, bodyOf(typed), ({ ejectionFraction = null, mets = null, ...answers }) => {
			const marks = RISK_MARKS.filter((mark) => answers[mark]);
			const open = ejectionFraction === null || mets === null;
			return {
				head: CLASSES[riskClass(ejectionFraction, mets, marks)](),
				lines: [],
				notes: open ? [m.calculators_class_open()] : []
			};
		})
};

/** The figures as numbers, the answers as yes and no; what nobody answered is left out. */
function bodyOf(typed: Typed): Record<string, unknown> {
	const { ejectionFraction = '', mets = '' } = typed;
	const answered = RISK_MARKS.filter((mark) => typed[mark]).map((mark) => [mark, typed[mark] === 'yes']);
	return { ...numbersOf({ ejectionFraction, mets }), ...Object.fromEntries(answered) };
}
