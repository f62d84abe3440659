/**
 * What a clinician has to know beside the rules themselves: how to read them, what they were checked against, and
 * which figures are the product's own. The page 'Rules and sources' and docs/CLINICAL.md are both made from these
 * lists, and from the cautions beside them.
 */
import { SYMPTOMS } from '../bedside/codes';
import { symptomStops } from '../bedside/rules/symptoms';
import { CAUTION_SHARE } from '../bedside/limits/table';

/** How long sternal precautions hold; what they forbid stands beside it. */
export const PRECAUTIONS_LEAD =
	'They begin with a sternotomy. Usual is 6 to 8 weeks; their end falls due for the surgeon’s decision after eight, and they never end by the calendar. Until then they forbid (common practice, advice differs between hospitals):';

const stopping = SYMPTOMS.filter(symptomStops).join(', ');

/** How the tables are to be read, a sentence or two for each point. */
export const HOW_TO_READ: readonly string[] = [
	'A rule gives a stop, a caution or a note. A stop on the reading before a session means: do not start. The outcome of a session is *stop* if any finding stops, else *incomplete* if a needed reading is missing, else *caution*, else *clear*.',
	'*Over* and *under* are strict: exactly the limit is still allowed. *At* includes the limit.',
	'There are three sets. *Strict* judges inpatients where nothing else is said; *guideline* follows the inpatient line of the American colleges, for units that choose it; *outpatient* judges the outpatient phase. *Off* means that the set has no such limit.',
	'The bare name of a limit stops. With `.before` it is for the reading before the session; with `.caution` it cautions.',
	`In the set *strict* a change also cautions from ${(CAUTION_SHARE.strict ?? 1) * 100} % of the limit on, also where a unit or a physician has set another one. The other sets wait for the limit.`,
	'A change is measured from the reading before the session, or from a later one marked as settled after a change of posture. Only readings in the same posture are compared, and pressures only from the same source, cuff or arterial line.',
	'A missing reading is never taken as normal. What could not be judged is listed as not judged.',
	'Whether a rate-slowing drug is taken may be unknown. Then the narrower limit holds, and a note says so.',
	'In the set *outpatient* the top of a prescribed range takes the place of the heart-rate ceiling. Exertion over the prescribed range cautions; more than two points over it stops. The range on record of a patient counts, with who prescribed it, when, and how it was found; a lower limit set for the patient stays.',
	`These symptoms stop: ${stopping}. Breathlessness stops from the grade that is its limit. Every other symptom cautions.`,
	'A unit may change any limit, entered by an administrator with the name of its clinical lead and the day it was agreed. A physician or surgeon may narrow or widen one for a patient, with a reason and a last day. Changes are numbered and never overwritten, and every stored finding keeps the set, the limit and the version that made it.'
];

export interface CheckEntry {
	readonly what: string;
	readonly values: string;
	/** Paths in the repository. */
	readonly tests: readonly string[];
}

const BEDSIDE = 'src/lib/domain/bedside';
const CALC = 'src/lib/domain/calculators';

/** What calculators and rules are tested against. *Computed*: worked out from the published formula, apart from the code. */
export const CHECKS: readonly CheckEntry[] = [
	{
		what: 'Early-warning score',
		values: "computed from the college's chart 1 as reproduced; the second saturation scale also in Thorax",
		tests: [`${CALC}/early-warning.test.ts`]
	},
	{
		what: 'Energy',
		values:
			'computed from the published equations; three rows also stand in print: 3.5 mph at 10 % is 29.76, 450 kg m/min at 62 kg about 20, 30 steps of 12 inches 31.4 mL/kg/min',
		tests: [`${CALC}/energy.test.ts`]
	},
	{
		what: 'Target heart rate',
		values:
			'computed; the published example is age 20, rest 75, 70 % is 162.5; heart failure by Keteyian 2012; the ceiling of inpatients from a secondary source',
		tests: [`${CALC}/heart-rate-target.test.ts`]
	},
	{
		what: 'Six-minute walk',
		values:
			'computed from the equations in the European Respiratory Journal; lower limits from memory; a change that matters, 25 m, Gremeaux 2011',
		tests: [`${CALC}/walk-test.test.ts`]
	},
	{
		what: 'Pressures',
		values:
			'computed; 120/80 with a mean of 93.3 also stands in WikiLectures; bands of the rate-pressure product as in Wikipedia',
		tests: [`${CALC}/pressures.test.ts`]
	},
	{
		what: 'Orthostatic hypotension',
		values: 'computed from the consensus of 2011, as summarised; from sitting, Shaw 2017',
		tests: [`${CALC}/orthostatic.test.ts`, `${BEDSIDE}/rules/postural.test.ts`]
	},
	{
		what: 'Risk class of an outpatient',
		values: 'computed from PMC8006124, table 3',
		tests: [`${CALC}/risk.test.ts`]
	},
	{
		what: 'Three-ball spirometer',
		values: 'flows of 600 and 1200 mL/s from published instructions, 900 from a leaflet; hints from memory',
		tests: [`${CALC}/spirometer.test.ts`]
	},
	{ what: 'Corridor', values: 'computed by the walking equation', tests: [`${CALC}/corridor.test.ts`] },
	{
		what: 'Levels',
		values: 'bands from memory; 2.5 mph as 2.914 METs by equation and 3.0 in the Compendium, stairs 4.0',
		tests: [`${BEDSIDE}/levels.test.ts`, `${BEDSIDE}/progress.test.ts`]
	},
	{
		what: 'Breastbone',
		values:
			'stability scale by El-Ansary 2018, what follows from memory; 5, 8 and 10 lb of published leaflets in kg',
		tests: [`${BEDSIDE}/sternum.test.ts`]
	},
	{
		what: 'Response rules',
		values:
			'each limit just under, at and over it; rows from the two inpatient lines, one from study notes (secondary), one from memory',
		tests: [
			`${BEDSIDE}/assess.test.ts`,
			`${BEDSIDE}/rules/edges.test.ts`,
			`${BEDSIDE}/rules/absolute.test.ts`,
			`${BEDSIDE}/rules/change.test.ts`,
			`${BEDSIDE}/rules/each-set.test.ts`,
			`${BEDSIDE}/rules/not-judged.test.ts`
		]
	},
	{
		what: 'Response rules, a second way',
		values:
			'10,000 random sessions against an implementation that shares no code with the first, and 10,000 more under random limits of unit, patient, body and prescribed range',
		tests: [`${BEDSIDE}/assess.oracle.test.ts`]
	},
	{
		what: 'Response rules, properties',
		values:
			'a finding never disappears when a reading gets worse, a missing reading never makes an outcome clear, the order of what has no order does not matter',
		tests: [
			`${BEDSIDE}/properties/worse.test.ts`,
			`${BEDSIDE}/properties/answers.test.ts`,
			`${BEDSIDE}/properties/context.test.ts`,
			`${BEDSIDE}/properties/order.test.ts`
		]
	},
	{
		what: 'Text messages',
		values: 'alphabet and lengths of 3GPP TS 23.038',
		tests: ['src/lib/domain/messages/sms-length.test.ts']
	}
];

export interface OwnFigure {
	readonly figure: string;
	/** Where it stands in the code. */
	readonly path: string;
}

/** Figures without a published source. Each needs the hospital's consent before clinical use. */
export const OWN_FIGURES: readonly OwnFigure[] = [
	{
		figure:
			'Who is told of an escalation, and after how long: high 0, 2, 3 and 8 minutes, then every 5; medium 0, 10 and 30 minutes, then every 30; low at once, then 1 and 4 hours, then every 4',
		path: 'src/lib/domain/escalations/chain.ts'
	},
	{ figure: 'The grade proposed for a call from a session', path: 'src/lib/domain/escalations/draft.ts' },
	{
		figure: 'What a patient may do at each level, and with how many helpers',
		path: 'src/lib/domain/episodes/may-do-now.ts'
	},
	{
		figure:
			'Eight weeks until ending the sternal precautions should be asked for (published advice runs from 6 to 12)',
		path: 'src/lib/domain/episodes/precautions.ts'
	},
	{
		figure: 'Two weeks until their end falls due again after a decision that did not end them',
		path: 'src/lib/domain/episodes/precautions.ts'
	},
	{
		figure: 'What is told to the surgeon the same day of a wound and a breastbone',
		path: 'src/lib/domain/wounds/advice.ts'
	},
	{
		figure: 'The corridor of 50 m that laps are counted on',
		path: `${CALC}/corridor.ts`
	},
	{
		figure: 'What sternal precautions forbid, and what follows from a moving breastbone',
		path: `${BEDSIDE}/sternum.ts`
	},
	{
		figure: 'Activities, their doses (except where an entry names a source) and the clearance each needs',
		path: `${BEDSIDE}/activities/activities.ts`
	},
	{ figure: 'The cautious dose, and when a senior signs', path: `${BEDSIDE}/doses.ts` },
	{
		figure: 'How what speaks for the next level is weighed against what holds a patient back',
		path: `${BEDSIDE}/progress.ts`
	},
	{ figure: 'How far a unit or a physician may move a limit', path: `${BEDSIDE}/limits/ranges.ts` },
	{
		figure: 'The 6 to 8 METs that daily life asks for, the goal after discharge',
		path: `${BEDSIDE}/levels.ts`
	},
	{
		figure:
			'What can be typed at all, and outside which range the pages ask once more: to be confirmed by each hospital',
		path: `${CALC}/bounds.ts`
	},
	{
		figure: 'What can be typed of a reading at the bedside: to be confirmed by each hospital',
		path: `${BEDSIDE}/bounds.ts`
	},
	{
		figure: 'When a patient is reminded of a visit, and between which hours',
		path: 'src/lib/domain/visits/reminders.ts'
	}
];
