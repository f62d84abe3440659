/** The rest of the second implementation: the rules that compare no two readings. Shares nothing with the rules. */
import type { Assessment } from '../forms';
import { past, type OracleRow } from './oracle';
import type { Bars } from './oracle-limits';

const ARM_FREE = new Set(['arm-exercise']);
const WALKS = new Set([
	'bedside-walk',
	'room-walk',
	'hall-walk',
	'hall-walk-long',
	'stairs',
	'treadmill-walk'
]);
const PASSIVE = new Set(['passive-legs', 'passive-arms']);
const OUT_OF_BED =
	'chair-sitting sit-to-stand seated-exercise bedside-walk room-walk seated-wash standing-warm-up standing-exercise';
const CLEARANCE_OF: Record<string, string> = {
	'self-feeding': 'oral-intake',
	'arm-exercise': 'arm-stage',
	stairs: 'stairs',
	'treadmill-walk': 'treadmill'
};
const HELD_BY: Record<string, string> = {
	...Object.fromEntries(OUT_OF_BED.split(' ').map((code) => [code, 'out-of-bed'])),
	'hall-walk': 'corridor',
	'hall-walk-long': 'corridor'
};
const NOT_NOW = 'withheld on-hold withdrawn lapsed'.split(' ');
const STOP_SYMPTOMS =
	'angina dizziness light-headedness fainting confusion sternal-click pallor distress new-bleeding line-dislodged'.split(
		' '
	);
/** Symptoms, rhythm, what is missing, and what was done. */
export function theRest(
	{ context, symptoms, activities, during, after, before }: Assessment,
	bars: Bars,
	rows: OracleRow[],
	found: Set<string>
): void {
	const taken = [after.hr, after.sbp, after.dbp, after.spo2, after.rr, after.rpe, after.pain];
	const now = during.length > 0 || taken.some((value) => value != null) ? 'during' : 'before';
	const done = activities.filter(({ notDone }) => !notDone);
	const irregular = rows.some(({ rhy }) => rhy !== 'sinus') || context.rhythm !== 'sinus';
	const codes = symptoms.map((symptom) => (typeof symptom === 'string' ? symptom : symptom.code));
	const breathless = symptoms.map((symptom) => (typeof symptom === 'string' ? 0 : (symptom.grade ?? 0)));
	for (const code of new Set(codes)) {
		const worst = Math.max(...breathless.filter((_, i) => codes[i] === code));
		const severe = code === 'breathlessness' && past(bars, 'symptom.breathlessness', worst);
		const stops = STOP_SYMPTOMS.includes(code) || severe;
		found.add(`symptom ${stops ? 'stop' : 'caution'} ${now}`);
	}
	const hot = (key: string) => context.temperature != null && past(bars, key, context.temperature);
	if (hot('temperature-ceiling') || hot('temperature-ceiling.caution')) {
		found.add(`temperature-ceiling ${hot('temperature-ceiling') ? 'stop' : 'caution'} before`);
	}
	if (context.vasopressorRising || context.balloonPump || context.pacingDependent || context.bleeding) {
		found.add('start-check stop before');
	}
	if (context.betaBlocked === null) {
		found.add(`beta-blocker-unknown note ${now}`);
	}
	if (irregular) {
		found.add(`rhythm-caveat note ${now}`);
	}
	if (irregular && [...during, after].every(({ rpe }) => rpe == null)) {
		found.add('reading-missing note after');
	}
	for (const row of rows) {
		if (row.rhy !== (row.when === 'before' ? context.rhythm : rows[0]?.rhy)) {
			found.add(`new-rhythm stop ${row.when}`);
		}
	}
	for (const [when, reading] of [
		['before', before],
		['after', after]
	] as const) {
		if (reading.hr == null) {
			found.add(`reading-missing note ${when}`);
		}
		if (reading.sbp == null || reading.dbp == null) {
			const walked = when === 'after' && done.some(({ code }) => WALKS.has(code));
			found.add(`reading-missing ${walked ? 'caution' : 'note'} ${when}`);
		}
	}
	const all = (context.clearances ?? []).map((clearance) =>
		typeof clearance === 'string' ? { kind: clearance, state: 'given' } : { state: 'given', ...clearance }
	);
	const granted = all.filter(({ state }) => state == null || state.startsWith('given'));
	const refused = all.filter(({ state }) => state != null && NOT_NOW.includes(state));
	const arms = granted
		.filter(({ kind }) => kind === 'arm-stage')
		.map((given) => ('maxElevationDeg' in given ? given.maxElevationDeg : null));
	const stated = arms.filter((value) => value != null);
	const height = arms.length === 0 ? 'arm-elevation' : 'arm-elevation.cleared';
	const own = stated.length === 0 ? null : Math.min(...stated);
	const follows = context.conscious && context.followsCommands !== false;
	for (const { code, elevationDeg, assistance, helper } of done) {
		const needs = CLEARANCE_OF[code];
		const has = needs === undefined || granted.some(({ kind }) => kind === needs);
		const may = HELD_BY[code];
		const held = refused.some(({ kind }) => kind === may) && !granted.some(({ kind }) => kind === may);
		if (held || (!has && (context.sternotomy || !ARM_FREE.has(code)))) {
			found.add(`clearance-missing stop ${now}`);
		}
		// The clearance's own height counts, unless somebody said a lower one of this patient.
		const lower = own !== null && bars[height]?.ours === true && bars[height].n < own;
		const tooHigh = (degrees: number) =>
			own === null || lower ? past(bars, height, degrees) : degrees > own;
		if (context.sternotomy && elevationDeg != null && tooHigh(elevationDeg)) {
			found.add(`arm-elevation stop ${now}`);
		}
		if (!follows && !PASSIVE.has(code)) {
			found.add(`not-following stop ${now}`);
		}
		if (code === 'splinted-cough' && (!follows || codes.includes('confusion'))) {
			found.add(`airway stop ${now}`);
		}
		if (code === 'incentive-spirometer' && (context.airway === 'tube' || context.airway === 'tracheostomy')) {
			found.add(`airway stop ${now}`);
		}
		if (code === 'stairs' && assistance !== 'one' && assistance !== 'two' && !helper) {
			found.add(`helper-missing caution ${now}`);
		}
	}
}
