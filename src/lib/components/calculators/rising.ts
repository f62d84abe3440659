/** A fall of the pressure on rising, measured on purpose. */
import { orthostatic, ORTHOSTATIC_CRITERIA, type OrthostaticCriterion } from '$lib/domain/calculators';
import { orthostaticBody } from '$lib/domain/calculators/page-forms';
import { m } from '$lib/i18n/paraglide/messages';
import { figure, numbersOf, workOut, type CalculatorSpec } from './spec';

const LABELS: Record<OrthostaticCriterion, () => string> = {
	'lying-to-standing': m.calculators_rising_lying,
	'high-lying-to-standing': m.calculators_rising_high,
	'sitting-to-standing': m.calculators_rising_sitting
};
const CRITERIA = (Object.keys(ORTHOSTATIC_CRITERIA) as OrthostaticCriterion[]).map((value) => ({
	value,
	label: LABELS[value]()
}));

export const orthostaticSpec: CalculatorSpec = {
	id: 'orthostatic',
	title: m.calculators_rising(),
	cautions: [m.calculators_rising_caution()],
	fields: () => [
		{
			name: 'criterion',
			label: m.calculators_rising_from(),
			options: CRITERIA,
			initial: 'lying-to-standing'
		},
		{ name: 'beforeSbp', label: m.calculators_before_sbp(), unit: 'mmHg' },
		{ name: 'beforeDbp', label: m.calculators_before_dbp(), unit: 'mmHg' },
		{ name: 'afterSbp', label: m.calculators_after_sbp(), unit: 'mmHg' },
		{ name: 'afterDbp', label: m.calculators_after_dbp(), unit: 'mmHg' }
	],
	work: (typed) => {
		const body = { ...numbersOf(typed), criterion: typed.criterion ?? 'lying-to-standing' };
		return workOut(orthostaticBody, body, ({ criterion, ...at }) => {
			const before = { sbp: at.beforeSbp, dbp: at.beforeDbp };
			const found = orthostatic(criterion, before, { sbp: at.afterSbp, dbp: at.afterDbp });
			const { systolic, diastolic } = ORTHOSTATIC_CRITERIA[criterion];
			return {
				head: found.positive ? m.calculators_rising_yes() : m.calculators_rising_no(),
				lines: [
					{ label: m.calculators_fell_systolic(), value: `${figure(found.systolicFall, 0)} mmHg` },
					{ label: m.calculators_fell_diastolic(), value: `${figure(found.diastolicFall, 0)} mmHg` }
				],
				notes: [
					diastolic === null
						? m.calculators_rising_counts_one({ systolic })
						: m.calculators_rising_counts({ systolic, diastolic })
				]
			};
		});
	}
};
