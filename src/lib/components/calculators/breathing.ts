/** The three-ball spirometer: what a breath may have moved, and when to rest. */
import {
	BALL_FLOWS_ML_PER_S,
	breathesTooOften,
	breathEstimateMl,
	BREATHS_PER_HOUR_HINT,
	capacityTooSmall,
	DISCHARGE_GOAL_BALLS
} from '$lib/domain/calculators';
import { spirometerBody } from '$lib/domain/calculators/page-forms';
import { m } from '$lib/i18n/paraglide/messages';
import { figure, numbersOf, workOut, type CalculatorSpec } from './spec';

const BALLS = ['1', '2', '3'].map((value) => ({ value, label: value }));

export const spirometerSpec: CalculatorSpec = {
	id: 'spirometer',
	title: m.calculators_spirometer(),
	cautions: [
		m.calculators_spirometer_caution(),
		m.bedside_balls_goal({ from: DISCHARGE_GOAL_BALLS[0], to: DISCHARGE_GOAL_BALLS[1] })
	],
	fields: () => [
		{ name: 'balls', label: m.calculators_balls(), options: BALLS, initial: '1' },
		{ name: 'seconds', label: m.calculators_held(), unit: 's' },
		{ name: 'breaths', label: m.calculators_breaths() },
		{ name: 'vitalCapacityMl', label: m.calculators_vital_capacity(), unit: 'mL' },
		{ name: 'weightKg', label: m.calculators_weight(), unit: 'kg' }
	],
	work: (typed) =>
		workOut(spirometerBody, { balls: 1, ...numbersOf(typed) }, (input) => {
			const { balls, seconds, breaths, vitalCapacityMl, weightKg } = input;
			const small =
				vitalCapacityMl != null && weightKg != null && capacityTooSmall(vitalCapacityMl, weightKg);
			const often = breaths != null && breathesTooOften(breaths);
			return {
				head: m.calculators_breath({ value: figure(breathEstimateMl(balls, seconds) ?? 0, 0) }),
				lines: [{ label: m.calculators_flow(), value: `${BALL_FLOWS_ML_PER_S[balls - 1]} mL/s` }],
				notes: [
					...(often ? [m.bedside_too_many_breaths({ most: BREATHS_PER_HOUR_HINT })] : []),
					...(small ? [m.calculators_capacity_small()] : [])
				]
			};
		})
};
