/**
 * The National Early Warning Score 2 of the Royal College of Physicians (2017), for adults at rest. Seven
 * observations each score 0 to 3; the total and any single 3 decide how soon somebody looks. It is a score at
 * rest: a pulse of 111 straight after a walk scores 2 by itself. The second saturation scale is for patients in
 * whom a named clinician has confirmed hypercapnic failure, and is never chosen by a calculation. A missing
 * observation leaves no total, because an absent value is not a normal one.
 *
 * Bands: RCP chart 1 as reproduced, scribd.com/document/584338409; second scale also Thorax,
 * thorax.bmj.com/highwire/markup/192780. Responses: chart 4, scribd.com/document/538260233. The score may be used
 * freely with the college acknowledged; the charts themselves are not reproduced here.
 */
import { exact } from '../bedside/numbers';
import type { EarlyWarningInput } from './forms';

export const OBSERVATIONS = ['rr', 'spo2', 'oxygen', 'sbp', 'pulse', 'consciousness', 'temperature'] as const;
export type Observation = (typeof OBSERVATIONS)[number];

export const RISKS = ['low', 'low-medium', 'medium', 'high'] as const;
export type Risk = (typeof RISKS)[number];

export interface EarlyWarning {
	/** 0 to 20, or null when something is missing. */
	readonly total: number | null;
	/** Points of each observation; null for what is missing. */
	readonly parts: Readonly<Record<Observation, number | null>>;
	readonly missing: readonly Observation[];
	readonly risk: Risk | null;
	/** Who is to do what and how soon; null when there is no total. */
	readonly response: string | null;
}

/** Points by band: the first entry whose bound the value stays under decides; the last has none. */
type Bands = readonly (readonly [under: number, points: number])[];

const RATE: Bands = [
	[9, 3],
	[12, 1],
	[21, 0],
	[25, 2],
	[Infinity, 3]
];
const SATURATION: Bands = [
	[92, 3],
	[94, 2],
	[96, 1],
	[Infinity, 0]
];
const SATURATION_2_ON_AIR: Bands = [
	[84, 3],
	[86, 2],
	[88, 1],
	[Infinity, 0]
];
const SATURATION_2_ON_OXYGEN: Bands = [
	[84, 3],
	[86, 2],
	[88, 1],
	[93, 0],
	[95, 1],
	[97, 2],
	[Infinity, 3]
];
const SYSTOLIC: Bands = [
	[91, 3],
	[101, 2],
	[111, 1],
	[220, 0],
	[Infinity, 3]
];
const PULSE: Bands = [
	[41, 3],
	[51, 1],
	[91, 0],
	[111, 1],
	[131, 2],
	[Infinity, 3]
];
/** In tenths of a degree, as the chart is read. */
const TEMPERATURE_TENTHS: Bands = [
	[351, 3],
	[361, 1],
	[381, 0],
	[391, 1],
	[Infinity, 2]
];

const OXYGEN_POINTS = 2;
const NOT_ALERT_POINTS = 3;

const RESPONSES: Readonly<Record<Risk, string>> = {
	low: 'Observations every 4 to 6 hours; the nurse decides whether to look more often or to call.',
	'low-medium':
		'Observations every hour; the nurse informs the medical team, who decide whether more is needed.',
	medium: 'Observations every hour; the nurse informs the medical team at once for an urgent assessment.',
	high: 'Continuous observation; immediate assessment by a team with critical-care skills, led by a senior.'
};
const RESPONSE_AT_ZERO = 'Observations every 12 hours.';

/** Score a set of observations taken at rest. */
export function earlyWarning(input: EarlyWarningInput): EarlyWarning {
	const parts = pointsOf(input);
	const missing = OBSERVATIONS.filter((observation) => parts[observation] === null);
	if (missing.length > 0) {
		return { total: null, parts, missing, risk: null, response: null };
	}
	const points = OBSERVATIONS.map((observation) => parts[observation] ?? 0);
	const total = points.reduce((sum, each) => sum + each, 0);
	const risk = riskOf(total, points);
	return { total, parts, missing, risk, response: total === 0 ? RESPONSE_AT_ZERO : RESPONSES[risk] };
}

function pointsOf(input: EarlyWarningInput): Record<Observation, number | null> {
	const { rr, oxygen, sbp, pulse, consciousness, temperature } = input;
	return {
		rr: banded(RATE, rr),
		spo2: saturationPoints(input),
		oxygen: oxygen == null ? null : OXYGEN_POINTS * Number(oxygen),
		sbp: banded(SYSTOLIC, sbp),
		pulse: banded(PULSE, pulse),
		consciousness: consciousness == null ? null : NOT_ALERT_POINTS * Number(consciousness !== 'A'),
		temperature: banded(TEMPERATURE_TENTHS, temperature == null ? null : Math.round(exact(temperature * 10)))
	};
}

/** On the second scale a high saturation is good on air and bad on oxygen, so it cannot be read without knowing. */
function saturationPoints({ spo2, scale, oxygen }: EarlyWarningInput): number | null {
	if (scale !== 2) {
		return banded(SATURATION, spo2);
	}
	const [onAir, onOxygen] = [banded(SATURATION_2_ON_AIR, spo2), banded(SATURATION_2_ON_OXYGEN, spo2)];
	if (oxygen == null) {
		return onAir === onOxygen ? onAir : null;
	}
	return oxygen ? onOxygen : onAir;
}

function banded(bands: Bands, value: number | null | undefined): number | null {
	if (value == null) {
		return null;
	}
	return bands.find(([under]) => value < under)?.[1] ?? null;
}

function riskOf(total: number, points: readonly number[]): Risk {
	if (total >= 7) {
		return 'high';
	}
	if (total >= 5) {
		return 'medium';
	}
	return points.includes(3) ? 'low-medium' : 'low';
}
