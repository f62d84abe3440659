/** The bodies of the calculators that only the page offers; the JSON API has those of `forms.ts`. */
import { z } from 'zod';
import { BOUNDS } from '../bedside';
import { numberWithin, oneOf, yesNo } from '../bedside/form-fields';
import { CALCULATOR_BOUNDS as OURS } from './bounds';
import { ORTHOSTATIC_CRITERIA, type OrthostaticCriterion } from './orthostatic';
import { RISK_MARKS, type RiskMark } from './risk';

export const heartFailureBody = z.object({
	age: numberWithin('age', OURS.ageYears),
	resting: numberWithin('resting', BOUNDS.hr),
	mode: oneOf('mode', ['treadmill', 'cycle'])
});

/** A cap that lies at the resting rate or below leaves nothing to rise by. */
export const inpatientCeilingBody = z
	.object({ resting: numberWithin('resting', BOUNDS.hr), cap: numberWithin('cap', BOUNDS.hr) })
	.superRefine(({ resting, cap }, ctx) => {
		if (resting >= cap) {
			const message = `resting is ${resting}: it must lie below the cap of ${cap}.`;
			ctx.addIssue({ code: 'custom', path: ['resting'], message, input: resting });
		}
	});

const CRITERIA = Object.keys(ORTHOSTATIC_CRITERIA) as [OrthostaticCriterion, ...OrthostaticCriterion[]];

/** The pressure before rising and the lowest within three minutes after. */
export const orthostaticBody = z
	.object({
		criterion: oneOf('criterion', CRITERIA),
		beforeSbp: numberWithin('beforeSbp', BOUNDS.sbp),
		beforeDbp: numberWithin('beforeDbp', BOUNDS.dbp),
		afterSbp: numberWithin('afterSbp', BOUNDS.sbp),
		afterDbp: numberWithin('afterDbp', BOUNDS.dbp)
	})
	.superRefine((body, ctx) => {
		for (const [sbp, dbp] of [
			['beforeSbp', 'beforeDbp'],
			['afterSbp', 'afterDbp']
		] as const) {
			if (body[sbp] <= body[dbp]) {
				const message = `${sbp} is ${body[sbp]} and ${dbp} is ${body[dbp]}: the systolic pressure must be above the diastolic.`;
				ctx.addIssue({ code: 'custom', path: [sbp], message, input: body[sbp] });
			}
		}
	});

const marks = Object.fromEntries(RISK_MARKS.map((mark) => [mark, yesNo(mark)])) as Record<
	RiskMark,
	z.ZodBoolean
>;

/** Each mark is answered; what was not measured may be left out, and is never low. */
export const riskBody = z.object({
	ejectionFraction: numberWithin('ejectionFraction', OURS.ejectionFraction).nullish(),
	mets: numberWithin('mets', OURS.mets).nullish(),
	...marks
});

export const spirometerBody = z.object({
	balls: z.literal([1, 2, 3], {
		error: ({ input }) => `balls is ${JSON.stringify(input) ?? 'missing'}: it must be 1, 2 or 3.`
	}),
	seconds: numberWithin('seconds', OURS.holdSeconds),
	breaths: numberWithin('breaths', OURS.breathsAnHour).nullish(),
	vitalCapacityMl: numberWithin('vitalCapacityMl', OURS.vitalCapacityMl).nullish(),
	weightKg: numberWithin('weightKg', OURS.weightKg).nullish()
});
