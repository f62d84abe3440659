/** The recorded sessions as plots: one for each value, over the sessions, against the limits that judged them. */
import type { MarkShape, PlotEvent, PlotLimit, PlotPoint, PlotTick, Range } from '$lib/components/plot/plot';
import { GRADE_WORDS } from '$lib/components/ui/grades';
import { DRAWN, type Drawn, type KeptBar } from '$lib/domain/bedside/drawn';
import { isInError } from '$lib/domain/bedside/amended';
import type { RuleId } from '$lib/domain/bedside/codes';
import { isBeyond } from '$lib/domain/bedside/rules/bar';
import type { SessionLine } from '$lib/domain/bedside/views';
import type { Nameboard } from '$lib/domain/episodes/views';
import { dayAndClock, type Reader } from '$lib/format';
import { localDateOf } from '$lib/domain/core/time';
import { m } from '$lib/i18n/paraglide/messages';
import { barWords, edgeWords, MEASURE_WORDS, MOMENT_WORDS, tickDay, UNIT_WORDS } from './plot-words';
import { outcomeWords } from './words';

export interface SessionPlot {
	key: Drawn;
	title: string;
	unit: string;
	mark: MarkShape;
	runs: PlotPoint[][];
	limits: PlotLimit[];
}

export interface SessionPlots {
	plots: SessionPlot[];
	across: Range;
	ticks: PlotTick[];
	events: PlotEvent[];
	/** How many sessions are drawn. */
	shown: number;
	/** How many could be: one that was entered in error counts for nothing. */
	all: number;
}

/** More would not leave a finger's width between them on a phone. */
export const SESSIONS_DRAWN = 6;
/** The share of a session's place in which its readings stand. */
const WIDTH = 0.6;

/** Where a finding is marked when its limit is not drawn: the value it speaks of, and which end of it. */
const MARKED: Partial<Record<RuleId, readonly [measure: Drawn, end: 'most' | 'least'][]>> = {
	'systolic-ceiling': [['sbp', 'most']],
	'systolic-rise': [['sbp', 'most']],
	'systolic-floor': [['sbp', 'least']],
	'systolic-fall': [['sbp', 'least']],
	'systolic-stage-fall': [['sbp', 'least']],
	'postural-fall': [['sbp', 'least']],
	'mean-floor': [
		['sbp', 'least'],
		['dbp', 'least']
	],
	'diastolic-ceiling': [['dbp', 'most']],
	'heart-rate-ceiling': [['hr', 'most']],
	'heart-rate-rise': [['hr', 'most']],
	'heart-rate-floor': [['hr', 'least']],
	'heart-rate-fall': [['hr', 'least']],
	'saturation-floor': [['spo2', 'least']],
	'saturation-fall': [['spo2', 'least']],
	'exertion-ceiling': [['rpe', 'most']]
};

type Placed = { moment: 'before' | 'during' | 'after'; value: number | null; x: number };

/**
 * @param sessions newest first, as they are listed; one that was entered in error is not drawn
 * @param escalations of the same stay; those since the first session that is drawn become ticks
 */
export function sessionPlots(
	sessions: readonly SessionLine[],
	escalations: Nameboard['escalations'],
	reader: Reader
): SessionPlots {
	const standing = sessions.filter((session) => !isInError(session));
	const drawn = standing.slice(0, SESSIONS_DRAWN).toReversed();
	const plots = DRAWN.map((measure): SessionPlot => {
		const parts = drawn.map((session, at) => partOf(session, at, measure, reader));
		return {
			key: measure,
			title: MEASURE_WORDS[measure](),
			unit: UNIT_WORDS[measure](),
			mark: measure === 'dbp' ? 'ring' : 'disc',
			runs: parts.map(({ run }) => run).filter((run) => run.length > 0),
			limits: parts.flatMap(({ limits }) => limits)
		};
	});
	return {
		plots: plots.filter(({ runs }) => runs.length > 0),
		across: { from: -0.25, to: Math.max(drawn.length - 1, 0) + WIDTH + 0.25 },
		ticks: ticksOf(drawn, reader),
		events: eventsOf(drawn, escalations, reader),
		shown: drawn.length,
		all: standing.length
	};
}

/** One session in the plot of one value: its points, joined, and the stretches of its limits. */
function partOf(session: SessionLine, at: number, measure: Drawn, reader: Reader) {
	const placed = placeReadings(session, at, measure);
	const bars = (session.bars ?? []).filter((bar) => bar.measure === measure);
	const run = placed.flatMap(({ moment, value, x }, index): PlotPoint[] => {
		if (value === null) {
			return [];
		}
		const own = bars.filter(({ reading }) => reading === index);
		const when = `${dayAndClock(Date.parse(session.startedAt), reader)}, ${MOMENT_WORDS[moment]().toLowerCase()}`;
		const verdict = gravest([
			...own.filter((bar) => isBeyond(bar, value)).map(({ grade }) => grade),
			...foundAt(session, measure, placed, index)
		]);
		return [{ x, y: value, moment: when, verdict, limits: own.map((bar) => barWords(bar)).join(', ') }];
	});
	return { run, limits: stretches(bars, placed) };
}

function placeReadings({ before, during, after }: SessionLine, at: number, measure: Drawn): Placed[] {
	const readings = [
		{ moment: 'before' as const, reading: before },
		...during.map((reading) => ({ moment: 'during' as const, reading })),
		{ moment: 'after' as const, reading: after }
	];
	const step = WIDTH / (readings.length - 1);
	return readings.map(({ moment, reading }, index) => ({
		moment,
		value: reading[measure] ?? null,
		x: at + index * step
	}));
}

/** What the findings say about this very reading: the extreme value of its moment is the one that was judged. */
function foundAt(
	session: SessionLine,
	measure: Drawn,
	placed: readonly Placed[],
	index: number
): ('stop' | 'caution')[] {
	const here = placed[index];
	const same = placed.filter(({ moment, value }) => moment === here?.moment && value !== null);
	return session.findings.flatMap(({ rule, reading, grade }) => {
		const ends = (MARKED[rule] ?? []).filter(([value]) => value === measure).map(([, end]) => end);
		if (reading !== here?.moment || grade === 'note' || ends.length === 0) {
			return [];
		}
		const values = same.map(({ value }) => value ?? 0);
		const extreme = ends[0] === 'most' ? Math.max(...values) : Math.min(...values);
		return here.value === extreme ? [grade] : [];
	});
}

function gravest(grades: readonly ('stop' | 'caution')[]): PlotPoint['verdict'] {
	return grades.includes('stop') ? 'stop' : (grades[0] ?? null);
}

/** Each limit holds half way to the readings beside the one it judged; alike neighbours are one line. */
function stretches(bars: readonly KeptBar[], placed: readonly Placed[]): PlotLimit[] {
	const half = WIDTH / (placed.length - 1) / 2;
	// What bars a start stands in the table: drawn, its far higher ceilings would flatten every curve.
	const inEffort = bars.filter(({ reading }) => reading > 0);
	const found: PlotLimit[] = [];
	for (const bar of inEffort) {
		const x = placed[bar.reading]?.x ?? 0;
		const label = edgeWords(bar);
		const before = found.find(
			(each) => each.label === label && each.y === bar.value && each.to > x - half - 0.01
		);
		if (before) {
			found[found.indexOf(before)] = { ...before, to: x + half };
		} else {
			found.push({ from: x - half, to: x + half, y: bar.value, label, grade: bar.grade });
		}
	}
	return found;
}

/** The day below each session, once for those of one day; the month only where it changes, for want of room. */
function ticksOf(drawn: readonly SessionLine[], reader: Reader): PlotTick[] {
	const days = drawn.map(({ startedAt }) => localDateOf(Date.parse(startedAt), reader.zone));
	return days.flatMap((day, at) => {
		const before = days[at - 1];
		const label = tickDay(day, before?.slice(0, 7) !== day.slice(0, 7), reader);
		return day === before ? [] : [{ x: at + WIDTH / 2, label }];
	});
}

/** How each session ended, and each call for help since the first of them, where it falls between them. */
function eventsOf(
	drawn: readonly SessionLine[],
	escalations: Nameboard['escalations'],
	reader: Reader
): PlotEvent[] {
	const starts = drawn.map(({ startedAt }) => Date.parse(startedAt));
	const outcomes = drawn.map(({ outcome, findings }, at) => ({
		at: starts[at] ?? 0,
		x: at + WIDTH,
		words: outcomeWords(outcome, findings)
	}));
	const calls = escalations.flatMap(({ raisedAt, grade }) => {
		const at = Date.parse(raisedAt);
		const after = starts.filter((start) => start <= at).length - 1;
		const words = m.patient_plots_escalation({ grade: GRADE_WORDS[grade]().toLowerCase() });
		return after < 0 ? [] : [{ at, x: after + WIDTH + 0.15, words }];
	});
	return [...outcomes, ...calls]
		.sort((one, other) => one.at - other.at)
		.map(({ at, x, words }) => ({ x, label: `${dayAndClock(at, reader)}: ${words}` }));
}
