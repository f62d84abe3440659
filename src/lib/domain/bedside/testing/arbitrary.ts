/** Random sessions for property tests: whatever the schema accepts, with values that like to sit at a limit. */
import fc from 'fast-check';
import { CLEARANCE_KINDS, CLEARANCE_STATES, LEVELS, RHYTHMS } from '../../core/codes';
import { ACTIVITY_CODES } from '../activities/codes';
import {
	AIRWAYS,
	ASSISTANCE,
	LIMIT_KEYS,
	PHASES,
	POSTURES,
	PRESSURE_SOURCES,
	SETS,
	SYMPTOMS,
	type LimitKey
} from '../codes';
import type { LocalLayers } from '../limits/layers';
import { rangeOf } from '../limits/ranges';
import type { ActivityDone, Assessment, Context, Reading, Symptom } from '../forms';

const maybe = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: undefined, freq: 3 });

/** Whole numbers mostly, tenths sometimes: limits are whole, and 80 % of them are not. */
const about = (low: number, high: number) =>
	fc.oneof(
		{ weight: 3, arbitrary: fc.integer({ min: low, max: high }) },
		{ weight: 1, arbitrary: fc.integer({ min: low * 10, max: high * 10 }).map((tenths) => tenths / 10) }
	);

const values = fc.record({
	hr: maybe(about(35, 140)),
	pressure: maybe(fc.tuple(about(80, 260), about(30, 120)).filter(([sbp, dbp]) => sbp > dbp)),
	half: fc.constantFrom('both', 'both', 'both', 'sbp', 'dbp'),
	spo2: maybe(about(84, 100)),
	rr: maybe(about(8, 40)),
	rpe: maybe(about(6, 20)),
	pain: maybe(about(0, 10))
});

/** One reading. */
export const anyReading: fc.Arbitrary<Reading> = fc
	.record({
		values,
		posture: maybe(fc.constantFrom(...POSTURES)),
		settled: maybe(fc.boolean()),
		work: maybe(fc.integer({ min: 0, max: 4 })),
		bpSource: maybe(fc.constantFrom(...PRESSURE_SOURCES)),
		rhythm: fc.option(fc.constantFrom(...RHYTHMS), { nil: undefined, freq: 1 })
	})
	.map(({ values: { pressure, half, ...rest }, ...more }) => ({
		...rest,
		...more,
		sbp: half === 'dbp' ? undefined : pressure?.[0],
		dbp: half === 'sbp' ? undefined : pressure?.[1]
	}));

/** Answered with no mostly, not at all sometimes, with yes now and then: a yes hides every other outcome. */
const startCheck = fc.constantFrom(undefined, null, false, false, false, false, false, false, true);

const anyContext: fc.Arbitrary<Context> = fc.record({
	set: maybe(fc.constantFrom(...SETS)),
	phase: maybe(fc.constantFrom(...PHASES)),
	betaBlocked: fc.constantFrom(true, false, null),
	rhythm: fc.constantFrom('sinus' as const, 'sinus' as const, ...RHYTHMS),
	sternotomy: fc.boolean(),
	level: fc.constantFrom(...LEVELS),
	conscious: fc.boolean(),
	followsCommands: maybe(fc.boolean()),
	airway: maybe(fc.constantFrom(...AIRWAYS)),
	vasopressorRising: startCheck,
	balloonPump: startCheck,
	pacingDependent: startCheck,
	bleeding: startCheck,
	temperature: maybe(about(36, 40)),
	clearances: maybe(
		fc.array(
			fc.oneof(
				fc.constantFrom(...CLEARANCE_KINDS),
				fc.record({
					kind: fc.constantFrom(...CLEARANCE_KINDS),
					state: maybe(fc.constantFrom(...CLEARANCE_STATES)),
					maxElevationDeg: maybe(about(30, 120))
				})
			),
			{ maxLength: 6 }
		)
	),
	prescribed: maybe(fc.record({ hrMax: maybe(about(90, 150)), rpeMax: maybe(about(10, 16)) }))
});

const anySymptom: fc.Arbitrary<Symptom> = fc.oneof(
	fc.constantFrom(...SYMPTOMS),
	fc.record({ code: fc.constantFrom(...SYMPTOMS), grade: maybe(fc.integer({ min: 1, max: 4 })) })
);

const anyActivity: fc.Arbitrary<ActivityDone> = fc.record({
	code: fc.constantFrom(...ACTIVITY_CODES),
	elevationDeg: maybe(about(0, 130)),
	assistance: maybe(fc.constantFrom(...ASSISTANCE)),
	helper: maybe(fc.boolean()),
	notDone: maybe(fc.boolean())
});

/** One session. */
export const anySession: fc.Arbitrary<Assessment> = fc.record({
	context: anyContext,
	before: anyReading,
	during: fc.array(anyReading, { maxLength: 4 }),
	after: anyReading,
	symptoms: fc.array(anySymptom, { maxLength: 2 }),
	activities: fc.array(anyActivity, { maxLength: 2 })
});

const anyKey = fc.constantFrom(...LIMIT_KEYS);
/** A limit of that name within the range it may be moved in. */
const within = (key: LimitKey) => {
	const { low, high } = rangeOf(key);
	return fc.integer({ min: Math.ceil(low), max: Math.floor(high) });
};
const keyAndValue = anyKey.chain((key) => fc.record({ key: fc.constant(key), value: within(key) }));

/** What a unit and a physician may lay over the defaults, and a range on record, in no particular order. */
export const anyLayers: fc.Arbitrary<LocalLayers> = fc
	.record({
		unit: fc.array(fc.record({ of: keyAndValue, set: fc.constantFrom(...SETS), back: fc.boolean() }), {
			maxLength: 6
		}),
		patient: fc.array(keyAndValue, { maxLength: 4 }),
		prescribed: maybe(fc.record({ hrMax: maybe(about(90, 150)), rpeMax: maybe(about(10, 16)) })),
		turned: fc.boolean()
	})
	.map(({ unit, patient, prescribed, turned }) => {
		const changes = unit.map(({ of, set, back }, index) => ({
			version: index + 1,
			set,
			key: of.key,
			// Now and then a later change takes an earlier one back.
			value: back && index > 2 ? null : of.value,
			agreedBy: 'Maeve Tidewell',
			agreedOn: '2026-02-02'
		}));
		const own = patient.map((limit, index) => ({
			...limit,
			version: index + 1,
			setBy: 'Orla Marsh',
			untilOn: '2026-03-05'
		}));
		return {
			unit: turned ? changes.reverse() : changes,
			patient: turned ? own.reverse() : own,
			prescribed: prescribed
				? {
						version: 1,
						hrMin: null,
						hrMax: prescribed.hrMax ?? null,
						rpeMin: null,
						rpeMax: prescribed.rpeMax ?? null,
						method: 'walk-test' as const,
						prescribedBy: 'Orla Marsh',
						prescribedOn: '2026-03-01'
					}
				: null
		};
	});

/** Limits that the body of a session itself states. */
export const anyLimits: fc.Arbitrary<NonNullable<Context['limits']>> = fc
	.array(keyAndValue, { maxLength: 3 })
	.map((limits) => Object.fromEntries(limits.map(({ key, value }) => [key, value])));

/** Values as they mostly are: complete, and near enough to a limit now and then to reach a caution. */
const calmReading: fc.Arbitrary<Reading> = fc.record({
	hr: about(70, 88),
	sbp: about(112, 124),
	dbp: about(66, 84),
	spo2: about(93, 98),
	rr: about(12, 24),
	rpe: about(9, 14),
	pain: about(0, 4)
});

/** A session as it mostly is, so that a property also meets the outcomes `clear` and `caution`. */
export const calmSession: fc.Arbitrary<Assessment> = fc.record({
	context: anyContext.map((context): Context => ({
		...context,
		vasopressorRising: false,
		balloonPump: false,
		pacingDependent: false,
		bleeding: false,
		temperature: 36.9,
		prescribed: undefined
	})),
	before: calmReading,
	during: fc.array(calmReading, { maxLength: 2 }),
	after: calmReading,
	symptoms: fc.constant([]),
	activities: fc.constant([])
});
