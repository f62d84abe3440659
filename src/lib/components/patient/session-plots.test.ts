import { describe, expect, it } from 'vitest';
import { assess } from '$lib/domain/bedside/assess';
import { barsOf } from '$lib/domain/bedside/bars';
import { session, type Changes } from '$lib/domain/bedside/testing/sample';
import type { SessionLine } from '$lib/domain/bedside/views';
import { SESSIONS_DRAWN, sessionPlots } from './session-plots';

const READER = { zone: 'Europe/Dublin', now: Date.UTC(2026, 2, 9) };

/** A recorded session of the given day of March, as the server lists it. */
function recorded(day: number, changes: Changes = {}, kept = true): SessionLine {
	const input = session({ during: [], ...changes });
	const { findings, outcome, set, version } = assess(input);
	const startedAt = new Date(Date.UTC(2026, 2, day, 10)).toISOString();
	return {
		...{ id: `${day}`, startedAt, endedAt: startedAt, level: 3, outcome },
		...{
			limitSet: set,
			limitVersion: version,
			recordedBy: 'Orla Brannigan',
			recordedById: 'orla',
			recordedAt: startedAt
		},
		amendments: [],
		...{ activities: [], symptoms: [], deviation: null, findings, bars: kept ? barsOf(input) : null },
		...{ before: input.before, during: input.during, after: input.after }
	};
}

function plotOf(key: string, ...sessions: SessionLine[]) {
	const found = sessionPlots(sessions, [], READER).plots.find((plot) => plot.key === key);
	return found ?? expect.fail(`no plot of ${key}`);
}

const verdicts = (key: string, each: SessionLine) =>
	plotOf(key, each)
		.runs.flat()
		.map(({ verdict }) => verdict);

/** A pulse that rises by this much on a rate-slowing drug, where 12 is the limit. */
const rise = (by: number): Changes => ({
	context: { betaBlocked: true },
	before: { hr: 70 },
	after: { hr: 70 + by }
});

describe('the marks of a plot', () => {
	it.each([
		[9, [null, null]],
		// 80 % of 12 is 9.6: common practice, no published source.
		[10, [null, 'caution']],
		[12, [null, 'caution']],
		[13, [null, 'stop']]
	])('of a pulse that rises by %d of 12 are %j', (by, marks) => {
		expect(verdicts('hr', recorded(1, rise(by)))).toEqual(marks);
	});

	it('stand by the findings where the limits were not kept', () => {
		expect(verdicts('hr', recorded(1, rise(10), false))).toEqual([null, 'caution']);
		expect(plotOf('hr', recorded(1, rise(10), false)).limits).toEqual([]);
	});

	it('stand at every reading beyond, not only at the worst of a moment', () => {
		const during = [
			{ sbp: 100, dbp: 60 },
			{ sbp: 104, dbp: 60 },
			{ sbp: 119, dbp: 60 }
		];
		expect(verdicts('sbp', recorded(1, { before: { sbp: 120 }, during, after: { sbp: 121 } }))).toEqual([
			null,
			'stop',
			'stop',
			null,
			null
		]);
	});
});

describe('the limits of a plot', () => {
	it('follow the base of each session', () => {
		const first = recorded(1, { before: { sbp: 128 }, after: { sbp: 128 } });
		const second = recorded(2, { before: { sbp: 110 }, after: { sbp: 110 } });
		const falls = plotOf('sbp', second, first)
			.limits.filter(({ label }) => label === 'lower stop')
			.map(({ y, grade }) => [y, grade]);
		// 10 under each base: the textbook's strict limit.
		expect(falls).toEqual([
			[118, 'stop'],
			[100, 'stop']
		]);
	});

	it('are said beside each point in the table', () => {
		const [, after] = plotOf('dbp', recorded(1)).runs.flat();
		expect(after?.limits).toBe('stop from 110, caution from 100');
	});
});

describe('what is drawn', () => {
	it('is the newest sessions, the oldest of them at the left', () => {
		const sessions = Array.from({ length: SESSIONS_DRAWN + 2 }, (_, index) => recorded(9 - index));
		const { ticks, shown } = sessionPlots(sessions, [], READER);
		expect(shown).toBe(SESSIONS_DRAWN);
		expect(ticks.map(({ label }) => label)).toEqual(['4 Mar', '5', '6', '7', '8', '9']);
	});

	it('leaves a session out that was entered in error', () => {
		const kind = 'entered-in-error' as const;
		const amendment = { kind, at: '', by: 'Orla Brannigan', reason: 'Wrong patient.' };
		const wrong = { ...recorded(2), amendments: [amendment as unknown as SessionLine['amendments'][number]] };
		const { shown, all } = sessionPlots([recorded(3), wrong, recorded(1)], [], READER);
		expect({ shown, all }).toEqual({ shown: 2, all: 2 });
	});

	it('leaves a value out that was never measured', () => {
		expect(sessionPlots([recorded(1)], [], READER).plots.map(({ key }) => key)).toEqual([
			'hr',
			'sbp',
			'dbp',
			'spo2'
		]);
	});

	it('ticks each outcome, and the calls for help since the first session where they fell', () => {
		const call = (day: number) => ({
			...{
				id: `e${day}`,
				grade: 'high' as const,
				state: 'settled' as const,
				situation: 'Pale.',
				raisedById: 'p1',
				takenBy: null
			},
			notThere: false,
			raisedAt: new Date(Date.UTC(2026, 2, day, 12)).toISOString()
		});
		const { events } = sessionPlots([recorded(3), recorded(2, rise(13))], [call(1), call(2)], READER);
		expect(events.map(({ label }) => label)).toEqual([
			'Mon 2 Mar 10:00: stop',
			'Mon 2 Mar 12:00: escalation, high',
			'Tue 3 Mar 10:00: clear'
		]);
		expect(events.map(({ x }) => x)).toEqual(events.map(({ x }) => x).toSorted((a, b) => a - b));
	});
});
