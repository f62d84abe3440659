import { describe, expect, it } from 'vitest';
import { CALCULATOR_SPECS } from './all';
import { corridorSpec, energySpec, heartRateSpec } from './effort';
import { earlyWarningSpec, pressuresSpec } from './observations';
import type { CalculatorSpec, Result, Typed } from './spec';
import { walkChangeSpec, walkTestSpec } from './walk';

function resultOf(spec: CalculatorSpec, typed: Typed): Result {
	const worked = spec.work(typed);
	if (worked.kind !== 'result') {
		throw new Error(`${spec.id} gave no result: ${JSON.stringify(worked)}.`);
	}
	return worked.result;
}
const values = ({ lines }: Result) => lines.map(({ value }) => value);

// The first row of the RCP chart that is raised: computed (bands: scribd.com/document/584338409).
const RAISED: Typed = {
	atRest: 'yes',
	rr: '21',
	spo2: '94',
	scale: '1',
	oxygen: 'yes',
	sbp: '118',
	pulse: '90',
	consciousness: 'A',
	temperature: '37,0'
};

describe('the early-warning score on the page', () => {
	it('is that of the API', () => {
		const { head, lines } = resultOf(earlyWarningSpec, RAISED);
		expect(head).toBe('5 points, risk medium');
		expect(lines.map(({ value }) => value)).toEqual(['2', '1', '2', '0', '0', '0', '0']);
	});

	it.each<[string, Typed, string]>([
		['not at rest', { ...RAISED, atRest: 'no' }, 'faults'],
		['nobody has said whether at rest', { ...RAISED, atRest: '' }, 'open'],
		['the second scale on nobody’s entry', { ...RAISED, scale: '2' }, 'open'],
		['the second scale on a blank', { ...RAISED, scale: '2', clinician: ' ' }, 'open']
	])('is not given: %s', (_, typed, kind) => {
		expect(earlyWarningSpec.work(typed).kind).toBe(kind);
	});

	it('names the clinician of the second scale', () => {
		const { notes } = resultOf(earlyWarningSpec, { ...RAISED, scale: '2', clinician: 'Dr Una Fairlead' });
		expect(notes.at(-1)).toBe('Second saturation scale on the entry of Dr Una Fairlead.');
	});

	it('has no total while something is missing, and names it', () => {
		const { head } = resultOf(earlyWarningSpec, { ...RAISED, temperature: '' });
		expect(head).toBe('No total: Temperature missing');
	});
});

it.each<[string, CalculatorSpec, Typed, string, string[]]>([
	[
		'WikiLectures, Mean arterial pressure: 120/80 is 93.3',
		pressuresSpec,
		{ hr: '70', sbp: '120', dbp: '80' },
		'Mean pressure 93 mmHg',
		['40 mmHg', '8400', '0.58']
	],
	[
		'computed: 400 m in six minutes are 66.67 m/min and 2.90 METs',
		corridorSpec,
		{ lengthM: '50', laps: '4', extraM: '', minutes: '6' },
		'400 m',
		['66.7 m/min', '2.9 METs']
	],
	[
		'ACSM Metabolic Equations: 3.5 mph at 10 % is 29.76',
		energySpec,
		{ mode: 'walk', speedMPerMin: '93.8', gradePercent: '10' },
		'8.5 METs, estimated',
		['29.8 mL/kg/min']
	],
	[
		'computed by reserve: age 65, rest 72, 220-age',
		heartRateSpec,
		{ age: '65', resting: '72', method: '220-age' },
		'Maximum 155 /min by 220-age',
		['105 /min', '114 /min', '122 /min', '130 /min', '138 /min']
	],
	[
		'computed: European Respiratory Journal, reference equations',
		walkTestSpec,
		{ sex: 'male', ageYears: '65', heightCm: '172', weightKg: '80', distanceM: '400' },
		'526 m predicted, estimated',
		['373 m', '76 %, not below the lower limit']
	],
	[
		'Gremeaux 2011: 25 m',
		walkChangeSpec,
		{ beforeM: '400', afterM: '425', against: 'coronary' },
		'+25 m: a change that matters',
		['25 m']
	],
	[
		'under it',
		walkChangeSpec,
		{ beforeM: '400', afterM: '376', against: 'coronary' },
		'-24 m: less than what patients notice',
		['25 m']
	]
])('%s', (_, spec, typed, head, lines) => {
	const result = resultOf(spec, typed);
	expect(result.head).toBe(head);
	expect(values(result)).toEqual(lines);
});

describe('what is typed', () => {
	it('out of bounds is said beside its field with value and limit, and nothing is worked out', () => {
		expect(pressuresSpec.work({ hr: '251', sbp: '120', dbp: '80' })).toEqual({
			kind: 'faults',
			faults: { hr: 'hr is 251: it must be a number from 20 to 250 beats/min.' }
		});
	});

	it('and is no number is said too', () => {
		expect(pressuresSpec.work({ hr: '7o', sbp: '120', dbp: '80' })).toMatchObject({
			faults: { hr: 'hr is "7o": it must be a number from 20 to 250 beats/min.' }
		});
	});

	it('outside the range of an equation is shown and marked', () => {
		const slow = resultOf(energySpec, { mode: 'walk', speedMPerMin: '40.2', gradePercent: '' });
		expect([slow.head, slow.notes[0]]).toEqual([
			'2.1 METs, estimated',
			'Outside the range the equation was made for: shown, and not to be relied on.'
		]);
		const old = resultOf(walkTestSpec, { sex: 'female', ageYears: '81', heightCm: '160', weightKg: '68' });
		expect(old.notes).toEqual(['Outside the ages it was made for: shown, and not to be relied on.']);
	});

	it('of a kind of work that was chosen before is not carried over', () => {
		const typed = { mode: 'leg-cycle', speedMPerMin: '900', watts: '50', weightKg: '80' };
		expect(resultOf(energySpec, typed).head).toBe('3.9 METs, estimated');
	});

	it.each(CALCULATOR_SPECS.map((spec) => [spec.id, spec] as const))(
		'%s: nothing yet, and cautions',
		(_, spec) => {
			expect(spec.work({}).kind).toBe('open');
			expect(spec.cautions.length).toBeGreaterThan(0);
			const names = spec.fields({}).map(({ name }) => name);
			expect(new Set(names).size).toBe(names.length);
		}
	);
});
