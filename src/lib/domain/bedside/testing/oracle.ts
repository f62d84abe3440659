/**
 * The response rules once more, worked out a second way and for tests only: straight from the table of the API,
 * with its numbers written out, in one pass over the readings. It shares no code and no constant with the rules,
 * so that an error would have to be made twice to go unnoticed. The limits come from `oracle-limits.ts`, layer by layer.
 */
import type { Assessment, Reading } from '../forms';
import { barsOf, type Bars, type OracleLayers } from './oracle-limits';
import { theRest } from './oracle-rest';

export interface OracleRow extends Reading {
	when: 'before' | 'during' | 'after';
	pos: string;
	src: string;
	rhy: string;
	moved: number;
}

const HEIGHT: Record<string, number> = { lying: 0, sitting: 1, standing: 2 };

/** Whole billionths, so that differences are exact. */
const big = (value: number) => Math.round(value * 1e9);

/** Whether a value crosses the limit of that name; never where the limit is off. */
export function past(bars: Bars, key: string, value: number): boolean {
	const bar = bars[key];
	if (!bar) {
		return false;
	}
	const by = big(value) - big(bar.n);
	return bar.how === '>' ? by > 0 : bar.how === '>=' ? by >= 0 : by < 0;
}

/** From 80 % of a limit on: in the strict set alone. */
function near(bars: Bars, key: string, value: number, set: string): boolean {
	const bar = bars[key];
	return set === 'strict' && bar != null && big(value) * 10 >= big(bar.n) * 8;
}

const NO_LAYERS: OracleLayers = { unit: [], patient: [] };

/** The set that judges where nobody says which: outpatients have one of their own. */
function setOf({ context: { set, phase } }: Assessment): string {
	return set ?? (phase === 'outpatient' ? 'outpatient' : 'strict');
}

/**
 * The findings as `rule grade reading`, without repeats, and the outcome.
 * @param set the one that judges; left out, that of the context
 */
export function workedOut(
	input: Assessment,
	layers: OracleLayers = NO_LAYERS,
	set = setOf(input)
): { found: Set<string>; outcome: string } {
	const found = new Set<string>();
	const bars = barsOf(input, set, layers);
	const rows = laidOut(input);
	byItself(bars, rows, found);
	againstBase(input, { bars, set }, rows, found);
	risingWork({ bars, set }, rows, found);
	risingUp(input, bars, rows, found);
	theRest(input, bars, rows, found);
	const grades = [...found].map((line) => line.split(' ')[1]);
	const missing = [...found].some((line) => line.startsWith('reading-missing'));
	const quiet = grades.includes('caution') ? 'caution' : 'clear';
	return { found, outcome: grades.includes('stop') ? 'stop' : missing ? 'incomplete' : quiet };
}

function laidOut({ context, before, during, after }: Assessment): OracleRow[] {
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

function byItself(bars: Bars, rows: OracleRow[], found: Set<string>): void {
	for (const { when, hr, sbp, dbp, spo2, rr, rpe, pain } of rows) {
		const rest = when === 'before';
		const say = (rule: string, value: number, stop: string, caution?: string) => {
			const stops = past(bars, stop, value);
			if (stops || (caution !== undefined && past(bars, caution, value))) {
				put(found, rule, stops ? 'stop' : 'caution', when);
			}
		};
		const ceiling = (rule: string, value: number, caution?: string) =>
			say(rule, value, rest ? `${rule}.before` : rule, caution);
		if (sbp != null) {
			ceiling('systolic-ceiling', sbp, rest ? undefined : 'systolic-ceiling.caution');
			say('systolic-floor', sbp, 'systolic-floor');
		}
		if (sbp != null && dbp != null) {
			say('mean-floor', (sbp + 2 * dbp) / 3, 'mean-floor');
		}
		if (dbp != null) {
			ceiling('diastolic-ceiling', dbp, 'diastolic-ceiling.caution');
		}
		if (hr != null) {
			ceiling('heart-rate-ceiling', hr, rest ? undefined : 'heart-rate-ceiling.caution');
			say('heart-rate-floor', hr, 'heart-rate-floor', 'heart-rate-floor.caution');
		}
		if (rr != null) {
			ceiling('respiratory-ceiling', rr, `respiratory-ceiling.${rest ? 'before-caution' : 'caution'}`);
		}
		if (spo2 != null) {
			say('saturation-floor', spo2, 'saturation-floor', 'saturation-floor.caution');
		}
		if (rpe != null && !rest) {
			say('exertion-ceiling', rpe, 'exertion-ceiling', 'exertion-ceiling.caution');
		}
		if (pain != null) {
			say('pain-ceiling', pain, 'pain-ceiling', 'pain-ceiling.caution');
		}
	}
}

interface Judging {
	bars: Bars;
	set: string;
}

function againstBase(
	{ context }: Assessment,
	{ bars, set }: Judging,
	rows: OracleRow[],
	found: Set<string>
): void {
	const pulse = context.betaBlocked === false ? 'heart-rate-rise' : 'heart-rate-rise.beta-blocked';
	const check = (rule: string, field: 'sbp' | 'hr' | 'spo2', sign: 1 | -1, key = rule) => {
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
			const change = (Number(row[field]) - Number(base[field])) * sign;
			if (rule === 'saturation-fall') {
				if (past(bars, key, change)) {
					put(found, rule, 'caution', row.when);
				}
			} else if (past(bars, key, change)) {
				put(found, rule, rule === 'heart-rate-rise' && row.rhy !== 'sinus' ? 'caution' : 'stop', row.when);
			} else if (near(bars, key, change, set)) {
				put(found, rule, 'caution', row.when);
			}
		});
	};
	check('systolic-fall', 'sbp', -1);
	check('systolic-rise', 'sbp', 1);
	check('heart-rate-rise', 'hr', 1, pulse);
	check('saturation-fall', 'spo2', -1);
}

function risingWork({ bars, set }: Judging, rows: OracleRow[], found: Set<string>): void {
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
				if (past(bars, rule, from - to)) {
					put(found, rule, 'stop', 'during');
				} else if (near(bars, rule, from - to, set)) {
					put(found, rule, 'caution', 'during');
				}
			}
		}
	}
}

function risingUp({ symptoms }: Assessment, bars: Bars, rows: OracleRow[], found: Set<string>): void {
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
		if (past(bars, 'postural-fall', systolic.by)) {
			found.add(`postural-fall stop ${systolic.when}`);
		} else if (past(bars, 'postural-fall.systolic', systolic.by)) {
			found.add(`postural-fall ${alone} ${systolic.when}`);
		} else if (past(bars, 'postural-fall.diastolic', diastolic.by)) {
			found.add(`postural-fall ${alone} ${diastolic.when}`);
		}
	}
}
