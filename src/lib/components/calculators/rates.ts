/** Two more heart rates: the maximum in heart failure, and how far an inpatient may rise. */
import { heartFailureMaximum, inpatientCeiling } from '$lib/domain/calculators';
import { heartFailureBody, inpatientCeilingBody } from '$lib/domain/calculators/page-forms';
import { m } from '$lib/i18n/paraglide/messages';
import { figure, numbersOf, workOut, type CalculatorSpec } from './spec';

const MODES = [
	{ value: 'treadmill', label: m.calculators_mode_treadmill() },
	{ value: 'cycle', label: m.calculators_mode_cycle() }
];

export const heartFailureSpec: CalculatorSpec = {
	id: 'heart-failure-maximum',
	title: m.calculators_failure(),
	cautions: [m.calculators_failure_caution()],
	fields: () => [
		{ name: 'age', label: m.calculators_age(), unit: m.calculators_years() },
		{ name: 'resting', label: m.calculators_resting(), unit: '/min' },
		{ name: 'mode', label: m.calculators_measured_on(), options: MODES, initial: 'treadmill' }
	],
	work: (typed) =>
		workOut(heartFailureBody, { ...numbersOf(typed), mode: typed.mode ?? 'treadmill' }, (input) => ({
			head: m.calculators_failure_result({
				value: figure(heartFailureMaximum(input.age, input.resting, input.mode), 0)
			}),
			lines: [],
			notes: [m.calculators_failure_error()]
		}))
};

export const inpatientCeilingSpec: CalculatorSpec = {
	id: 'inpatient-ceiling',
	title: m.calculators_ceiling(),
	cautions: [m.calculators_ceiling_caution()],
	fields: () => [
		{ name: 'resting', label: m.calculators_resting(), unit: '/min' },
		{ name: 'cap', label: m.calculators_cap(), unit: '/min', initial: '130' }
	],
	work: (typed) =>
		workOut(inpatientCeilingBody, numbersOf(typed), ({ resting, cap }) => {
			const ceiling = inpatientCeiling(resting, cap);
			return {
				head: m.calculators_ceiling_result({ value: figure(ceiling, 0) }),
				lines: [{ label: m.calculators_above_rest(), value: `${figure(ceiling - resting, 0)} /min` }],
				notes: ceiling === cap ? [m.calculators_capped()] : []
			};
		})
};
