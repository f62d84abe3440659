/** The six-minute walk: what is predicted, and whether two walks differ by what matters. */
import { MEANINGFUL_CHANGES, walkChange, walkTest } from '$lib/domain/calculators';
import { walkChangeBody, walkTestBody, type WalkTestInput } from '$lib/domain/calculators/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { figure, numbersOf, workOut, type CalculatorSpec, type Result } from './spec';

const SEXES = [
	{ value: '', label: m.calculators_choose() },
	{ value: 'female', label: m.calculators_female() },
	{ value: 'male', label: m.calculators_male() },
	{ value: 'other', label: m.calculators_other() },
	{ value: 'unknown', label: m.calculators_unknown() }
];
const GROUPS = [
	{ value: 'coronary', label: m.calculators_group_coronary() },
	{ value: 'cardiac-pooled', label: m.calculators_group_cardiac() },
	{ value: 'heart-failure', label: m.calculators_group_failure() },
	{ value: 'respiratory', label: m.calculators_group_respiratory() }
];

export const walkTestSpec: CalculatorSpec = {
	id: 'walk-test',
	title: m.calculators_walk_test(),
	cautions: [m.calculators_walk_test_caution()],
	fields: () => [
		{ name: 'sex', label: m.calculators_sex(), options: SEXES, initial: '' },
		{ name: 'ageYears', label: m.calculators_age(), unit: m.calculators_years() },
		{ name: 'heightCm', label: m.calculators_height(), unit: 'cm' },
		{ name: 'weightKg', label: m.calculators_weight(), unit: 'kg' },
		{ name: 'distanceM', label: m.calculators_walked(), unit: 'm' }
	],
	work: (typed) => workOut(walkTestBody, numbersOf(typed), predictionOf)
};

function predictionOf(input: WalkTestInput): Result {
	const { predictedM, lowerLimitM, percent, belowLowerLimit, inRange } = walkTest(input);
	if (predictedM === null || lowerLimitM === null) {
		return { head: m.calculators_no_equation(), lines: [], notes: [] };
	}
	const below = belowLowerLimit ? m.calculators_below() : m.calculators_not_below();
	return {
		head: m.calculators_predicted({ value: figure(predictedM, 0) }),
		lines: [
			{ label: m.calculators_lower_limit(), value: `${figure(lowerLimitM, 0)} m` },
			...(percent === null
				? []
				: [{ label: m.calculators_percent(), value: `${figure(percent, 0)} %, ${below}` }])
		],
		notes: [inRange ? m.calculators_in_range() : m.calculators_age_out_of_range()]
	};
}

export const walkChangeSpec: CalculatorSpec = {
	id: 'walk-change',
	title: m.calculators_change(),
	cautions: [m.calculators_change_caution()],
	fields: () => [
		{ name: 'beforeM', label: m.calculators_first_walk(), unit: 'm' },
		{ name: 'afterM', label: m.calculators_second_walk(), unit: 'm' },
		{ name: 'against', label: m.calculators_against(), options: GROUPS, initial: 'coronary' }
	],
	work: (typed) => {
		const body = { ...numbersOf(typed), against: typed.against ?? 'coronary' };
		return workOut(walkChangeBody, body, ({ beforeM, afterM, against }) => {
			const { changeM, matters, thresholdM } = walkChange(beforeM, afterM, against);
			const words = matters ? m.calculators_matters : m.calculators_does_not_matter;
			return {
				head: words({ change: `${changeM > 0 ? '+' : ''}${figure(changeM, 0)}` }),
				lines: [{ label: m.calculators_threshold(), value: `${thresholdM} m` }],
				notes: [MEANINGFUL_CHANGES[against].source]
			};
		});
	}
};
