import { describe, expect, it } from 'vitest';
import type { z } from 'zod';
import {
	heartFailureBody,
	inpatientCeilingBody,
	orthostaticBody,
	riskBody,
	spirometerBody
} from './page-forms';
import { RISK_MARKS } from './risk';

const NO_MARKS = Object.fromEntries(RISK_MARKS.map((mark) => [mark, false]));
const RISEN = {
	criterion: 'lying-to-standing',
	beforeSbp: 138,
	beforeDbp: 80,
	afterSbp: 116,
	afterDbp: 72
};

/** The first complaint about a body, or null when it is taken. */
function complaint(schema: z.ZodType, body: unknown): string | null {
	return schema.safeParse(body).error?.issues[0]?.message ?? null;
}

// Plausible bounds: common practice, no published source; just inside and just outside each end.
describe.each([
	['ejectionFraction', riskBody, NO_MARKS, 5, 85, '%'],
	['mets', riskBody, NO_MARKS, 0.8, 20, 'METs'],
	['seconds', spirometerBody, { balls: 1 }, 0.5, 20, 's'],
	['breaths', spirometerBody, { balls: 1, seconds: 3 }, 0, 200, 'breaths'],
	['vitalCapacityMl', spirometerBody, { balls: 1, seconds: 3 }, 100, 8000, 'mL'],
	['age', heartFailureBody, { resting: 70, mode: 'cycle' }, 16, 110, 'years'],
	['cap', inpatientCeilingBody, { resting: 30 }, 31, 250, 'beats/min']
] as [string, z.ZodType, object, number, number, string][])('%s', (field, schema, rest, low, high, unit) => {
	it.each([low, high])('takes %d', (value) => {
		expect(complaint(schema, { ...rest, [field]: value })).toBeNull();
	});

	it('names field, value and limit beyond it', () => {
		expect(complaint(schema, { ...rest, [field]: high + 0.1 })).toContain(
			`${field} is ${high + 0.1}: it must`
		);
		expect(complaint(schema, { ...rest, [field]: high + 0.1 })).toContain(`to ${high} ${unit}`);
	});
});

it.each([
	[inpatientCeilingBody, { resting: 130, cap: 130 }, 'resting is 130: it must lie below the cap of 130.'],
	[orthostaticBody, { ...RISEN, afterDbp: 116 }, 'afterSbp is 116 and afterDbp is 116'],
	[orthostaticBody, { ...RISEN, criterion: 'x' }, 'criterion is "x"'],
	[spirometerBody, { balls: 4, seconds: 3 }, 'balls is 4: it must be 1, 2 or 3.'],
	[spirometerBody, { seconds: 3 }, 'balls is missing'],
	[riskBody, { ...NO_MARKS, depression: 'yes' }, 'depression is "yes": it must be true or false.']
] as [z.ZodType, object, string][])('refuses %#', (schema, body, message) => {
	expect(complaint(schema, body)).toContain(message);
});
