import { describe, expect, it } from 'vitest';
import { clearanceLimits, type ClearanceLimits } from '$lib/domain/clearances/forms';
import { CLEARANCE_KINDS, type ClearanceKind } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';
import { choicesOf, fieldsOf, limitsOf, wrongChoice, type LimitChoice } from './decision';
import { giveForm, refuseForm, type GiveFields } from './decision-forms';

describe('limitsOf', () => {
	it.each<[Pick<GiveFields, 'limit' | 'maxMinutes' | 'other'>, ClearanceLimits | undefined]>([
		[{}, undefined],
		[{ limit: 'none' }, undefined],
		[{ limit: '60' }, { maxElevationDeg: 60 }],
		[{ limit: '90' }, { maxElevationDeg: 90 }],
		[{ limit: '120' }, { maxElevationDeg: 120 }],
		[{ limit: 'one' }, { helpers: 'one' }],
		[{ limit: 'two' }, { helpers: 'two' }],
		[{ limit: 'none', other: 'No load.' }, { text: 'No load.' }],
		[{ maxMinutes: '20' }, { maxMinutes: 20 }],
		[{ maxMinutes: '' }, undefined],
		[
			{ limit: '90', other: 'No load.' },
			{ maxElevationDeg: 90, text: 'No load.' }
		]
	])('%j becomes %j', (fields, limits) => {
		expect(limitsOf(fields)).toEqual(limits);
	});

	it.each(CLEARANCE_KINDS)('of every choice of %s is a limit that the server takes', (kind) => {
		const { choices } = choicesOf(kind);
		const made = [...choices, undefined].map((limit) => limitsOf({ limit }) ?? {});
		expect(made.every((limits) => clearanceLimits.safeParse(limits).success)).toBe(true);
	});
});

describe('wrongChoice', () => {
	it.each<[ClearanceKind, LimitChoice | undefined, boolean]>([
		['arm-stage', undefined, true],
		['arm-stage', '90', false],
		['arm-stage', 'none', false],
		['arm-stage', 'one', true],
		['stairs', undefined, true],
		['stairs', 'two', false],
		['stairs', '90', true],
		['discharge', undefined, false],
		['discharge', 'none', true]
	])('%s with %s: %s', (kind, limit, wrong) => {
		expect(wrongChoice(kind, limit) !== null).toBe(wrong);
	});
});

describe('fieldsOf', () => {
	it.each<[ClearanceKind, ClearanceLimits | null, Partial<GiveFields>]>([
		['arm-stage', null, { limit: '90' }],
		['arm-stage', { maxElevationDeg: 60 }, { limit: '60' }],
		['arm-stage', { maxElevationDeg: 75, text: 'No load.' }, { limit: undefined, other: 'No load.' }],
		['arm-stage', { text: 'No load.' }, { limit: 'none', other: 'No load.' }],
		['stairs', null, { limit: 'one' }],
		['stairs', { helpers: 'two' }, { limit: 'two' }],
		['treadmill', { maxMinutes: 20 }, { limit: undefined, maxMinutes: '20' }],
		['discharge', null, { limit: undefined }]
	])('%s with %j opens with %j', (kind, limits, fields) => {
		expect(fieldsOf(kind, limits, null)).toMatchObject({ ...fields, seen: '' });
	});

	it('carries the decision that is in view', () => {
		expect(fieldsOf('stairs', null, '2026-03-03T09:01:00.000Z').seen).toBe('2026-03-03T09:01:00.000Z');
	});
});

describe('giveForm', () => {
	it.each<[Record<string, unknown>, string | null]>([
		[{}, null],
		[{ limit: '90' }, null],
		[{ limit: '91' }, m.clearances_choose_limit()],
		[{ maxMinutes: '' }, null],
		[{ maxMinutes: '1e' }, 'At most, minutes: “1e” is no number; write a whole number from 1 to 240.'],
		[{ maxMinutes: '0' }, 'At most, minutes: 0 cannot be taken; write a whole number from 1 to 240.'],
		[{ maxMinutes: '1' }, null],
		[{ maxMinutes: '240' }, null],
		[{ maxMinutes: '241' }, 'At most, minutes: 241 cannot be taken; write a whole number from 1 to 240.'],
		[{ maxMinutes: '1,5' }, 'At most, minutes: 1.5 cannot be taken; write a whole number from 1 to 240.'],
		[
			{ reviewOn: '2026-02-30' },
			'Review on: “2026-02-30” is no day; write one that exists, such as 14 12 2026.'
		],
		[{ reviewOn: '28 2 2026' }, null],
		[{ reviewOn: '2026-02-28' }, null],
		[{ note: 'x'.repeat(1000) }, null],
		[{ note: 'x'.repeat(1001) }, 'Note has 1001 characters, and the limit is 1000.'],
		[{ other: 'x'.repeat(200) }, null],
		[{ other: 'x'.repeat(201) }, 'Another limit has 201 characters, and the limit is 200.']
	])('%j: %s', (fields, message) => {
		const parsed = giveForm.safeParse(fields);
		expect(parsed.error?.issues[0]?.message ?? null).toBe(message);
	});
});

describe('refuseForm', () => {
	it.each([
		['', 'Reason is empty.'],
		['  ', 'Reason is empty.'],
		['Wound is wet.', null],
		['x'.repeat(1001), 'Reason has 1001 characters, and the limit is 1000.']
	])('%j: %s', (reason, message) => {
		expect(refuseForm.safeParse({ reason }).error?.issues[0]?.message ?? null).toBe(message);
	});
});
