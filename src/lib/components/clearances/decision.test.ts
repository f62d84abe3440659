import { describe, expect, it } from 'vitest';
import { clearanceLimits, type ClearanceLimits } from '$lib/domain/clearances/forms';
import { CLEARANCE_KINDS, type ClearanceKind } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';
import {
	choicesOf,
	fieldsOf,
	limitsOf,
	wrongChoice,
	wrongProposal,
	type About,
	type LimitChoice,
	type LimitFields
} from './decision';
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

	it('of "no limit" are none, though words stand in fields that have left the page', () => {
		const fields = { limit: 'none', maxMinutes: '20', other: '2.5 km/h' } as const;
		expect(limitsOf(fields, ['stated', 'none'])).toBeUndefined();
		expect(limitsOf(fields, ['60', 'none'])).toEqual({ maxMinutes: 20, text: '2.5 km/h' });
	});

	it.each(CLEARANCE_KINDS)('of every choice of %s is a limit that the server takes', (kind) => {
		const made = [...choicesOf(about({ kind })), undefined].map((limit) => limitsOf({ limit }) ?? {});
		expect(made.every((limits) => clearanceLimits.safeParse(limits).success)).toBe(true);
	});
});

const SPEED = { text: 'Level, up to 2.5 km/h' };

/** An undecided ask that proposes nothing and names no figure, but for what is given. */
function about(given: Partial<About>): About {
	return {
		kind: 'treadmill',
		question: 'May it start?',
		proposed: null,
		limits: null,
		decidedAt: null,
		...given
	};
}

describe('choicesOf', () => {
	it.each<[Partial<About>, LimitChoice[]]>([
		[{ kind: 'arm-stage' }, ['60', '90', '120', 'none']],
		[{ kind: 'stairs' }, ['one', 'two', 'none']],
		[{}, []],
		[{ proposed: SPEED }, ['stated', 'none']],
		[{ question: 'Level, 2.5 km/h?' }, ['stated', 'none']],
		[{ limits: SPEED, decidedAt: '2026-03-03T09:01:00.000Z' }, ['stated', 'none']],
		[{ kind: 'discharge', proposed: { text: 'With a carer' } }, ['stated', 'none']],
		[{ kind: 'arm-stage', proposed: { maxElevationDeg: 90 } }, ['60', '90', '120', 'none']]
	])('%j: %j', (given, choices) => {
		expect(choicesOf(about(given))).toEqual(choices);
	});
});

describe('wrongChoice', () => {
	it.each<[Partial<About>, LimitFields, string | null]>([
		[{ kind: 'arm-stage' }, {}, m.clearances_choose_limit()],
		[{ kind: 'arm-stage' }, { limit: '90' }, null],
		[{ kind: 'arm-stage' }, { limit: 'none' }, null],
		[{ kind: 'arm-stage' }, { limit: 'one' }, m.clearances_choose_limit()],
		[{ kind: 'stairs' }, {}, m.clearances_choose_limit()],
		[{ kind: 'stairs' }, { limit: 'two' }, null],
		[{ kind: 'stairs' }, { limit: '90' }, m.clearances_choose_limit()],
		[{ kind: 'discharge' }, {}, null],
		[{ kind: 'discharge' }, { limit: 'none' }, m.clearances_choose_limit()],
		// What was proposed, or named in words, is not passed over by one key.
		[{ proposed: SPEED }, {}, m.clearances_choose_limit()],
		[{ proposed: SPEED }, { limit: 'none' }, null],
		[{ proposed: SPEED }, { limit: 'stated', other: '2 km/h' }, null],
		[{ proposed: SPEED }, { limit: 'stated' }, m.clearances_state_limit()],
		[{ question: 'Level, 2.5 km/h?' }, {}, m.clearances_choose_limit()]
	])('%j with %j: %s', (given, fields, wrong) => {
		expect(wrongChoice(about(given), fields)).toBe(wrong);
	});
});

describe('wrongProposal', () => {
	it.each<[ClearanceKind, LimitChoice | undefined, boolean]>([
		['arm-stage', undefined, false],
		['arm-stage', '90', false],
		['arm-stage', 'one', true],
		['arm-stage', 'none', false],
		['treadmill', 'none', true],
		['treadmill', undefined, false],
		['treadmill', 'stated', true]
	])('%s with %s: %s', (kind, limit, wrong) => {
		expect(wrongProposal(kind, limit) !== null).toBe(wrong);
	});
});

describe('fieldsOf', () => {
	const GIVEN = '2026-03-03T09:01:00.000Z';
	it.each<[Partial<About>, Partial<GiveFields>]>([
		// What nobody has said is not chosen.
		[{ kind: 'arm-stage' }, { limit: undefined, other: undefined }],
		[{ kind: 'stairs' }, { limit: undefined }],
		[{ kind: 'discharge' }, { limit: undefined }],
		// What is proposed is the offer.
		[
			{ kind: 'arm-stage', proposed: { maxElevationDeg: 90 } },
			{ limit: '90', other: undefined }
		],
		[{ kind: 'stairs', proposed: { helpers: 'two' } }, { limit: 'two' }],
		[{ proposed: SPEED }, { limit: 'stated', other: SPEED.text }],
		[{ proposed: { maxMinutes: 10 } }, { limit: 'stated', maxMinutes: '10' }],
		[
			{ kind: 'arm-stage', proposed: { text: 'No load.' } },
			{ limit: undefined, other: 'No load.' }
		],
		// What is only named in words is offered, and whether it is a limit has to be chosen.
		[{ question: 'Level, 2.5 km/h?' }, { limit: undefined, other: '2.5 km/h' }],
		// What has no field of its own stays as words.
		[
			{ kind: 'arm-stage', proposed: { maxElevationDeg: 75, maxLoadKg: 1 } },
			{ limit: undefined, other: 'arms to 75 degrees, at most 1 kg' }
		],
		// What is in force comes before what was proposed.
		[
			{
				kind: 'arm-stage',
				proposed: { maxElevationDeg: 120 },
				limits: { maxElevationDeg: 60 },
				decidedAt: GIVEN
			},
			{ limit: '60' }
		],
		[
			{ kind: 'arm-stage', limits: { text: 'No load.' }, decidedAt: GIVEN },
			{ limit: 'none', other: 'No load.' }
		],
		[
			{ limits: { maxMinutes: 20 }, decidedAt: GIVEN },
			{ limit: 'stated', maxMinutes: '20' }
		],
		[
			{ proposed: SPEED, decidedAt: GIVEN },
			{ limit: 'none', other: undefined }
		]
	])('%j opens with %j', (given, fields) => {
		expect(fieldsOf(about(given))).toMatchObject(fields);
	});

	it('carries the decision that is in view', () => {
		expect(fieldsOf(about({})).seen).toBe('');
		expect(fieldsOf(about({ decidedAt: GIVEN })).seen).toBe(GIVEN);
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
