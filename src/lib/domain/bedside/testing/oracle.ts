/**
 * The response rules once more, worked out a second way and for tests only: straight from the table of the API,
 * with its numbers written out, in one pass over the readings. It shares no code and no constant with the rules,
 * so that an error would have to be made twice to go unnoticed. Only the default limits, no overrides.
 */
import type { Assessment, Reading } from '../forms';

interface Row extends Reading {
	when: 'before' | 'during' | 'after';
	pos: string;
	src: string;
	rhy: string;
	moved: number;
}

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
const HEIGHT: Record<string, number> = { lying: 0, sitting: 1, standing: 2 };

/** Whole billionths, so that differences are exact. */
const big = (value: number) => Math.round(value * 1e9);
const over = (value: number, limit: number) => big(value) > big(limit);
const under = (value: number, limit: number) => big(value) < big(limit);

/** The findings as `rule grade reading`, without repeats, and the outcome. */
export function workedOut(input: Assessment): { found: Set<string>; outcome: string } {
	const found = new Set<string>();
	const rows = laidOut(input);
	byItself(input, rows, found);
	againstBase(input, rows, found);
	risingWork(input, rows, found);
	risingUp(input, rows, found);
	theRest(input, rows, found);
	const grades = [...found].map((line) => line.split(' ')[1]);
	const missing = [...found].some((line) => line.startsWith('reading-missing'));
	const quiet = grades.includes('caution') ? 'caution' : 'clear';
	return { found, outcome: grades.includes('stop') ? 'stop' : missing ? 'incomplete' : quiet };
}

function laidOut({ context, before, during, after }: Assessment): Row[] {
	const list = [before, ...during, after];
	let pos: string = list.find((r) => r.posture)?.posture ?? '?';
	let src: string = list.find((r) => r.bpSource)?.bpSource ?? '?';
	let rhy: string = context.rhythm;
	let moved = 0;
	return list.map((r, i) => {
		const was = pos;
		pos = r.posture ?? pos;
		src = r.bpSource ?? src;
		rhy = r.rhythm ?? rhy;
		moved += i > 0 && was !== pos ? 1 : 0;
		return {
			...r,
			when: i === 0 ? 'before' : i === list.length - 1 ? 'after' : 'during',
			pos,
			src,
			rhy,
			moved
		};
	});
}

/** Add a finding, and let a stop of the same rule and moment take the place of a caution. */
function put(found: Set<string>, rule: string, grade: string, when: string): void {
	if (grade === 'caution' && found.has(`${rule} stop ${when}`)) {
		return;
	}
	if (grade === 'stop') {
		found.delete(`${rule} caution ${when}`);
	}
	found.add(`${rule} ${grade} ${when}`);
}

function byItself({ context }: Assessment, rows: Row[], found: Set<string>): void {
	const out = context.set === 'outpatient';
	const { hrMax, rpeMax } = (out && context.prescribed) || {};
	for (const { when, hr, sbp, dbp, spo2, rr, rpe, pain } of rows) {
		const rest = when === 'before';
		const say = (rule: string, stop: boolean, caution = false) => {
			if (stop || caution) {
				put(found, rule, stop ? 'stop' : 'caution', when);
			}
		};
		if (sbp != null) {
			say('systolic-ceiling', over(sbp, rest ? 180 : out ? 250 : 200), !rest && over(sbp, out ? 220 : 180));
			say('systolic-floor', under(sbp, 90));
		}
		if (sbp != null && dbp != null) {
			say('mean-floor', under((sbp + 2 * dbp) / 3, 60));
		}
		if (dbp != null) {
			say('diastolic-ceiling', out && !rest ? over(dbp, 115) : dbp >= 110, dbp >= 100);
		}
		if (hr != null) {
			say('heart-rate-ceiling', over(hr, rest ? 120 : (hrMax ?? 130)), !rest && over(hr, 120));
			say('heart-rate-floor', under(hr, 40), under(hr, 50));
		}
		if (rr != null) {
			say('respiratory-ceiling', over(rr, rest ? 30 : 35), over(rr, rest ? 24 : 30));
		}
		if (spo2 != null) {
			say('saturation-floor', under(spo2, 88), under(spo2, 90));
		}
		if (rpe != null && !rest) {
			say('exertion-ceiling', over(rpe, rpeMax == null ? 15 : rpeMax + 2), over(rpe, rpeMax ?? 13));
		}
		if (pain != null) {
			say('pain-ceiling', pain >= 7, pain >= 4);
		}
	}
}

function againstBase({ context }: Assessment, rows: Row[], found: Set<string>): void {
	const strict = context.set === 'strict';
	const pulseLimit = strict
		? context.betaBlocked === false
			? 20
			: 12
		: context.set === 'guideline'
			? 30
			: Infinity;
	const check = (rule: string, field: 'sbp' | 'hr' | 'spo2', sign: 1 | -1, limit: number) => {
		rows.forEach((row, at) => {
			if (at === 0 || row[field] == null) {
				return;
			}
			const bases = rows.slice(0, at).filter((base, i) => {
				const rested = i === 0 || (base.settled === true && base.moved > 0);
				return rested && base[field] != null && (field !== 'sbp' || base.src === row.src);
			});
			const base = bases.find(({ pos }) => pos === row.pos) ?? (row.posture ? undefined : bases.at(-1));
			if (base === undefined) {
				return;
			}
			const change = big((Number(row[field]) - Number(base[field])) * sign);
			if (rule === 'saturation-fall') {
				if (change >= big(limit)) {
					put(found, rule, 'caution', row.when);
				}
			} else if (change > big(limit)) {
				put(found, rule, rule === 'heart-rate-rise' && row.rhy !== 'sinus' ? 'caution' : 'stop', row.when);
			} else if (strict && change * 10 >= big(limit) * 8) {
				put(found, rule, 'caution', row.when);
			}
		});
	};
	check('systolic-fall', 'sbp', -1, 10);
	check('systolic-rise', 'sbp', 1, strict ? 30 : Infinity);
	check('heart-rate-rise', 'hr', 1, pulseLimit);
	check('saturation-fall', 'spo2', -1, 4);
}

function risingWork({ context }: Assessment, rows: Row[], found: Set<string>): void {
	const effort = rows.filter(({ when }) => when === 'during');
	for (const [i, later] of effort.entries()) {
		for (const earlier of effort.slice(0, i)) {
			if (
				earlier.work == null ||
				later.work == null ||
				earlier.work >= later.work ||
				earlier.pos !== later.pos
			) {
				continue;
			}
			for (const [rule, field] of [
				['systolic-stage-fall', 'sbp'],
				['heart-rate-fall', 'hr']
			] as const) {
				const [from, to] = [earlier[field], later[field]];
				if (from == null || to == null || (field === 'sbp' && earlier.src !== later.src)) {
					continue;
				}
				if (over(from - to, 10)) {
					put(found, rule, 'stop', 'during');
				} else if (context.set === 'strict' && !under(from - to, 8)) {
					put(found, rule, 'caution', 'during');
				}
			}
		}
	}
}

function risingUp({ symptoms }: Assessment, rows: Row[], found: Set<string>): void {
	for (let stay = 1; stay <= (rows.at(-1)?.moved ?? 0); stay += 1) {
		const here = rows.filter(({ moved }) => moved === stay);
		const there = rows.filter(({ moved }) => moved === stay - 1);
		if ((HEIGHT[here[0]?.pos ?? ''] ?? 0) <= (HEIGHT[there[0]?.pos ?? ''] ?? 0)) {
			continue;
		}
		const fall = (field: 'sbp' | 'dbp') => {
			const first = here.find((row) => row[field] != null);
			const last = there.filter((row) => row[field] != null && row.src === first?.src).at(-1);
			const by = first && last ? Number(last[field]) - Number(first[field]) : -Infinity;
			return { by, when: first?.when ?? '' };
		};
		const [systolic, diastolic] = [fall('sbp'), fall('dbp')];
		const alone = symptoms.length === 0 ? 'caution' : 'stop';
		if (over(systolic.by, 30)) {
			found.add(`postural-fall stop ${systolic.when}`);
		} else if (!under(systolic.by, 20)) {
			found.add(`postural-fall ${alone} ${systolic.when}`);
		} else if (!under(diastolic.by, 10)) {
			found.add(`postural-fall ${alone} ${diastolic.when}`);
		}
	}
}

function theRest(
	{ context, symptoms, activities, during, after, before }: Assessment,
	rows: Row[],
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
		const stops = STOP_SYMPTOMS.includes(code) || (code === 'breathlessness' && worst >= 3);
		found.add(`symptom ${stops ? 'stop' : 'caution'} ${now}`);
	}
	if (context.temperature != null && over(context.temperature, 38)) {
		found.add(`temperature-ceiling ${over(context.temperature, 38.5) ? 'stop' : 'caution'} before`);
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
	const height = arms.length === 0 ? 45 : stated.length === 0 ? 90 : Math.min(...stated);
	const follows = context.conscious && context.followsCommands !== false;
	for (const { code, elevationDeg, assistance, helper } of done) {
		const needs = CLEARANCE_OF[code];
		const has = needs === undefined || granted.some(({ kind }) => kind === needs);
		const may = HELD_BY[code];
		const held = refused.some(({ kind }) => kind === may) && !granted.some(({ kind }) => kind === may);
		if (held || (!has && (context.sternotomy || !ARM_FREE.has(code)))) {
			found.add(`clearance-missing stop ${now}`);
		}
		if (context.sternotomy && elevationDeg != null && over(elevationDeg, height)) {
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
