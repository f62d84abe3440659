/**
 * The limits of the second implementation: the table of the API with its numbers written out, and the layers laid
 * over it step by step, as the words have it. Shares no code and no constant with the rules.
 */
import type { Assessment } from '../forms';

/** How a value crosses a limit: over, at or under it; `ours` when it was said of this patient alone. */
type Bar = { n: number; how: '>' | '>=' | '<'; ours?: boolean };
export type Bars = Record<string, Bar | null>;

export interface OracleLayers {
	unit: readonly { version: number; set: string; key: string | null; value: number | null }[];
	patient: readonly { version: number; key: string; value: number }[];
	prescribed?: { hrMax: number | null; rpeMax: number | null } | null;
}

const COMMON = `
	systolic-ceiling > 200; systolic-ceiling.before > 180; systolic-ceiling.caution > 180
	systolic-floor < 90; mean-floor < 60
	diastolic-ceiling >= 110; diastolic-ceiling.before >= 110; diastolic-ceiling.caution >= 100
	heart-rate-ceiling > 130; heart-rate-ceiling.before > 120; heart-rate-ceiling.caution > 120
	heart-rate-floor < 40; heart-rate-floor.caution < 50
	respiratory-ceiling > 35; respiratory-ceiling.before > 30
	respiratory-ceiling.caution > 30; respiratory-ceiling.before-caution > 24
	saturation-floor < 88; saturation-floor.caution < 90
	exertion-ceiling > 15; exertion-ceiling.caution > 13
	pain-ceiling >= 7; pain-ceiling.caution >= 4
	temperature-ceiling > 38.5; temperature-ceiling.caution > 38
	systolic-fall > 10; systolic-stage-fall > 10; heart-rate-fall > 10; saturation-fall >= 4
	postural-fall > 30; postural-fall.systolic >= 20; postural-fall.diastolic >= 10
	arm-elevation > 45; arm-elevation.cleared > 90; symptom.breathlessness >= 3`;
const BY_SET: Record<string, string> = {
	strict: 'systolic-rise > 30; heart-rate-rise > 20; heart-rate-rise.beta-blocked > 12',
	guideline: 'heart-rate-rise > 30; heart-rate-rise.beta-blocked > 30',
	outpatient: 'systolic-ceiling > 250; systolic-ceiling.caution > 220; diastolic-ceiling > 115'
};
/** What is off in a set is switched on with the crossing that it has where it is on. */
const RISES = 'systolic-rise heart-rate-rise heart-rate-rise.beta-blocked'.split(' ');

function tableOf(set: string): Bars {
	const bars: Bars = Object.fromEntries(RISES.map((key) => [key, null]));
	for (const line of `${COMMON};${BY_SET[set] ?? ''}`.split(/[;\n]/)) {
		const [key = '', how, n] = line.trim().split(' ');
		if (key !== '') {
			bars[key] = { how: how as Bar['how'], n: Number(n) };
		}
	}
	return bars;
}

/** The newest value of each key; null among them takes a change back. */
function newestOf(rows: readonly { version: number; key: string | null; value: number | null }[]) {
	const sorted = rows.filter(({ key }) => key !== null).toSorted((a, b) => a.version - b.version);
	const all = Object.fromEntries(sorted.map(({ key, value }) => [key, value]));
	return Object.fromEntries(Object.entries(all).filter(([, value]) => value !== null)) as Record<
		string,
		number
	>;
}

/** Lay one layer on: whatever it says, nobody starts above what would stop them at once. */
function lay(bars: Bars, changes: Record<string, number>, ours = true): void {
	for (const [key, n] of Object.entries(changes)) {
		bars[key] = { n, how: bars[key]?.how ?? '>', ours };
	}
	for (const rule of ['systolic-ceiling', 'diastolic-ceiling', 'heart-rate-ceiling', 'respiratory-ceiling']) {
		const [start, stop] = [bars[`${rule}.before`], bars[rule]];
		const touched = rule in changes || `${rule}.before` in changes;
		if (touched && start && stop && stop.n < start.n) {
			bars[`${rule}.before`] = stop;
		}
	}
}

/** What judges a session: the set, the unit's changes, the patient's, what the body says, and a range. */
export function barsOf({ context }: Assessment, set: string, layers: OracleLayers): Bars {
	const bars = tableOf(set);
	const unit = newestOf(layers.unit.filter((change) => change.set === set));
	const [rise, drug] = [unit['heart-rate-rise'], bars['heart-rate-rise.beta-blocked']];
	// A unit that widens the rise says nothing about those on a rate-slowing drug; one that narrows it below does.
	if (rise !== undefined && !('heart-rate-rise.beta-blocked' in unit) && (!drug || rise < drug.n)) {
		unit['heart-rate-rise.beta-blocked'] = rise;
	}
	lay(bars, unit, false);
	lay(bars, both(newestOf(layers.patient)));
	const { maxElevationDeg, maxLoadKg: _load, ...named } = (context.limits ?? {}) as Record<string, number>;
	lay(
		bars,
		both({ ...(maxElevationDeg === undefined ? {} : { 'arm-elevation.cleared': maxElevationDeg }), ...named })
	);
	if (set === 'outpatient') {
		range(bars, layers.prescribed);
		range(bars, context.prescribed);
	}
	return bars;
}

/** For one patient a rise is meant with and without the drug. */
function both(changes: Record<string, number>): Record<string, number> {
	const rise = changes['heart-rate-rise'];
	return rise === undefined ? changes : { 'heart-rate-rise.beta-blocked': rise, ...changes };
}

/** The top of a range takes the place of the ceiling, unless somebody set a lower one. */
function range(
	bars: Bars,
	given: { hrMax?: number | null; rpeMax?: number | null } | null | undefined
): void {
	const put = (key: string, n: number) => {
		const bar = bars[key];
		if (bar && !(bar.ours && bar.n <= n)) {
			bars[key] = { ...bar, n, ours: true };
		}
	};
	if (given?.hrMax != null) {
		put('heart-rate-ceiling', given.hrMax);
	}
	if (given?.rpeMax != null) {
		put('exertion-ceiling', given.rpeMax + 2);
		put('exertion-ceiling.caution', given.rpeMax);
	}
}
