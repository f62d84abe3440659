import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { BOUNDS } from './bounds';
import { activityDoneSchema, assessBody, contextSchema, readingSchema, sessionBody } from './forms';

const context = { betaBlocked: false, rhythm: 'sinus', sternotomy: true, level: 3, conscious: true };
const body = { context, before: {}, during: [], after: {}, symptoms: [], activities: [] };
const session = {
	...body,
	startedAt: '2026-03-04T09:30:00Z',
	endedAt: '2026-03-04T09:45:00Z',
	level: 3
};

/** Each complaint as `pointer: message`, or an empty list when the value is accepted. */
function complaints(schema: z.ZodType, value: unknown): string[] {
	const result = schema.safeParse(value);
	return result.success
		? []
		: result.error.issues.map(({ path, message }) => `/${path.join('/')}: ${message}`);
}

// Hard bounds of what can be typed, written out here so that the table itself is checked: plausible bounds, from
// memory; 6 to 20 is the scale of exertion as Borg made it.
describe('the hard bounds', () => {
	it.each([
		['hr', 19, 20, 250, 251],
		['sbp', 49, 50, 280, 281],
		['dbp', 19, 20, 180, 181],
		['spo2', 49, 50, 100, 101],
		['rr', 3, 4, 60, 61],
		['rpe', 5, 6, 20, 21],
		['pain', -1, 0, 10, 11]
	])('%s: %d is refused, %d and %d are taken, %d is refused', (field, below, low, high, above) => {
		const taken = (value: number) => readingSchema.safeParse({ [field]: value }).success;
		expect([below, low, high, above].map(taken)).toEqual([false, true, true, false]);
	});

	it.each([
		[29.9, false],
		[30, true],
		[43, true],
		[43.1, false]
	])('a temperature of %d is taken: %s', (temperature, taken) => {
		const context = { betaBlocked: false, rhythm: 'sinus', sternotomy: true, level: 2, conscious: true };
		expect(contextSchema.safeParse({ ...context, temperature }).success).toBe(taken);
	});
});

describe('readings', () => {
	const fields = ['hr', 'sbp', 'dbp', 'spo2', 'rr', 'rpe', 'pain', 'oxygenLpm'] as const;

	it.each(fields)('%s is accepted at both hard bounds and refused beyond them', (field) => {
		const { low, high } = BOUNDS[field];
		for (const value of [low, high]) {
			expect(complaints(readingSchema, { [field]: value })).toEqual([]);
		}
		for (const value of [low - 1, high + 1, low - 0.01, high + 0.01]) {
			const [first, ...rest] = complaints(readingSchema, { [field]: value });
			expect(rest).toEqual([]);
			expect(first).toContain(`/${field}: ${field} is ${value}`);
			expect(first).toContain(`a number from ${low} to ${high}`);
		}
	});

	it.each([
		[121, 120, 0],
		[120, 120, 1],
		[119, 120, 1]
	])('a systolic of %i over a diastolic of %i gives %i complaint', (sbp, dbp, count) => {
		const found = complaints(readingSchema, { sbp, dbp });
		expect(found).toHaveLength(count);
		expect(found.join()).toBe(
			count === 0
				? ''
				: `/sbp: sbp is ${sbp} and dbp is ${dbp}: the systolic pressure must be above the diastolic.`
		);
	});

	it.each([
		['a word', { hr: '80' }, '/hr: hr is "80": it must be a number from 20 to 250 beats/min.'],
		['not a number', { hr: Number.NaN }, '/hr: hr is null'],
		[
			'a pulse typed as saturation',
			{ spo2: 101 },
			'/spo2: spo2 is 101: it must be a number from 50 to 100 %.'
		],
		[
			'an unknown posture',
			{ posture: 'kneeling' },
			'/posture: posture is "kneeling": it must be one of lying'
		],
		['a local time', { at: '2026-03-04 09:30' }, '/at: at is "2026-03-04 09:30"']
	])('%s is refused by name', (_what, reading, message) => {
		expect(complaints(readingSchema, reading)[0]).toContain(message);
	});

	it('takes null and absence alike as not measured', () => {
		expect(readingSchema.parse({ hr: null }).hr).toBeNull();
		expect(readingSchema.parse({}).hr).toBeUndefined();
	});
});

describe('context', () => {
	it.each(['betaBlocked', 'rhythm', 'sternotomy', 'level', 'conscious'])('%s must be given', (field) => {
		const found = complaints(contextSchema, { ...context, [field]: undefined });
		expect(found).toHaveLength(1);
		expect(found[0]).toContain(`/${field}: ${field} is missing`);
	});

	it('accepts a rate-slowing drug that is not known', () => {
		expect(complaints(contextSchema, { ...context, betaBlocked: null })).toEqual([]);
	});

	it.each([0, 7, 2.5, '3'])('refuses the level %j', (level) => {
		expect(complaints(contextSchema, { ...context, level })[0]).toContain('a whole number from 1 to 6');
	});

	it.each([
		['bare kinds', ['arm-stage', 'stairs'], []],
		['a kind with a limit', [{ kind: 'arm-stage', maxElevationDeg: 70 }], []],
		[
			'a clearance as the record has it',
			[{ kind: 'arm-stage', state: 'given', limits: { maxElevationDeg: 70 } }],
			[]
		],
		['an unknown kind', ['arms'], ['/clearances/0: clearance is "arms"']],
		[
			'a limit out of bounds',
			[{ kind: 'arm-stage', maxElevationDeg: 181 }],
			['/clearances/0/maxElevationDeg: maxElevationDeg is 181']
		]
	])('clearances: %s', (_what, clearances, expected) => {
		const found = complaints(contextSchema, { ...context, clearances });
		expect(found).toHaveLength(expected.length);
		expected.forEach((message, index) => expect(found[index]).toContain(message));
	});

	it.each([
		['a rule', { 'systolic-fall': 15 }, []],
		['a limit beside a rule', { 'heart-rate-rise.beta-blocked': 10 }, []],
		['the height of cleared arms', { maxElevationDeg: 70 }, []],
		['an unknown rule', { 'systolic-drop': 15 }, ['/limits: limits names systolic-drop,']],
		['a word', { 'systolic-fall': 'ten' }, ['/limits/systolic-fall: a limit is "ten"']]
	])('limits: %s', (_what, limits, expected) => {
		const found = complaints(contextSchema, { ...context, limits });
		expect(found).toHaveLength(expected.length);
		expected.forEach((message, index) => expect(found[index]).toContain(message));
	});

	it('refuses a prescribed range that ends below its start', () => {
		const found = complaints(contextSchema, { ...context, prescribed: { hrMin: 120, hrMax: 110 } });
		expect(found).toEqual([
			'/prescribed/hrMin: hrMin is 120 and hrMax is 110: the range must not end below its start.'
		]);
	});
});

describe('the body to judge', () => {
	it('fills in what is left out as empty, and never as normal', () => {
		expect(assessBody.parse({ context, before: null })).toEqual(body);
	});

	it.each([
		['a bare word', 'dizziness', null],
		['a grade', { code: 'breathlessness', grade: 4 }, null],
		['an unknown word', 'hiccups', '/symptoms/0: symptom is "hiccups"'],
		['an unknown code', { code: 'hiccups' }, '/symptoms/0: symptom is "hiccups"'],
		[
			'a grade beyond 4',
			{ code: 'angina', grade: 5 },
			'/symptoms/0/grade: grade is 5: it must be a number from 1 to 4.'
		]
	])('symptoms: %s', (_what, symptom, message) => {
		const found = complaints(assessBody, { ...body, symptoms: [symptom] });
		expect(found).toHaveLength(message === null ? 0 : 1);
		expect(found.join()).toContain(message ?? '');
	});

	it.each([
		['a helper by name', { code: 'stairs', helper: 'Brother of the patient' }, 0],
		['a helper who is simply there', { code: 'stairs', helper: true }, 0],
		['an unknown activity', { code: 'juggling' }, 1],
		['an impossible height', { code: 'arm-exercise', elevationDeg: 190 }, 1]
	])('activities: %s', (_what, activity, count) => {
		expect(complaints(assessBody, { ...body, activities: [activity] })).toHaveLength(count);
	});

	it.each([null, 'text', 3, []])('%j is no body', (value) => {
		expect(complaints(assessBody, value).length).toBeGreaterThan(0);
	});
});

describe('the body to store', () => {
	it('is the body to judge with its times, its level and, where need be, a deviation', () => {
		const deviation = { reason: 'Surgeon in theatre', verbalFrom: 'Dr Invented', readBack: true };
		expect(complaints(sessionBody, session)).toEqual([]);
		expect(complaints(sessionBody, { ...session, deviation })).toEqual([]);
	});

	it.each(['startedAt', 'endedAt', 'level'])('%s must be given', (field) => {
		expect(complaints(sessionBody, { ...session, [field]: undefined })[0]).toContain(`/${field}: `);
	});

	it('may end when it starts and not before', () => {
		expect(complaints(sessionBody, { ...session, endedAt: session.startedAt })).toEqual([]);
		expect(complaints(sessionBody, { ...session, endedAt: '2026-03-04T10:29:59+01:00' })).toEqual([
			'/endedAt: endedAt is 2026-03-04T10:29:59+01:00: it must not lie before startedAt, 2026-03-04T09:30:00Z.'
		]);
	});

	it('refuses a deviation without a reason', () => {
		expect(complaints(sessionBody, { ...session, deviation: { reason: '  ' } })).toEqual([
			'/deviation/reason: reason is empty: it must hold 1 to 2000 characters.'
		]);
	});
});

it('can be described as JSON Schema, which the API description is made from', () => {
	const described = z.toJSONSchema(sessionBody, { io: 'input' });
	expect(described.required).toEqual(['context', 'startedAt', 'endedAt', 'level']);
});

// Three balls, halves allowed: the device of common practice.
it.each([
	[-0.5, false],
	[0, true],
	[1.5, true],
	[3, true],
	[3.5, false]
])('%d balls are accepted: %s', (balls, accepted) => {
	const found = activityDoneSchema.safeParse({ code: 'incentive-spirometer', balls });
	expect(found.success).toBe(accepted);
	expect(found.error?.issues[0]?.message ?? '').toBe(
		accepted ? '' : `balls is ${balls}: it must be a number from 0 to 3 balls.`
	);
});
