import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** Whatever is drawn in an alarm colour: by a class, a variable, a table of grades, or a part that reads one. */
const ALARM = new RegExp(
	[
		/\b(text|bg|border|fill|stroke|outline|decoration|accent|ring|divide)(-[xytblr])?-(high|medium|low)\b/,
		/--(high|medium|low)\b/,
		/\bGRADE_(TEXT|GROUND|EDGE)\b/,
		/(variant|kind)(="|: '|=\{[^}]*')(alarm|stop)\b/,
		/<Grade(Mark|Shape)\b/
	]
		.map(({ source }) => source)
		.join('|')
);

/**
 * Red, yellow and cyan say "somebody is called" or "stop" (IEC 60601-1-8): on anything else they would teach people
 * to look past them. These files may, each with its reason; the folder of the escalations may too.
 */
const ALLOWED: Record<string, string> = {
	'src/lib/components/ui/grades.ts': 'the one table of grades and their colours',
	'src/lib/components/ui/button.ts': 'the one table of buttons, with those that raise and take a call',
	'src/lib/components/ui/control.ts': 'a number that a finding says stop to',
	'src/lib/components/ui/GradeMark.svelte': 'the grade of a call: shape and word',
	'src/lib/components/ui/GradeShape.svelte': 'the grade of a call: shape',
	'src/lib/components/ui/Aside.svelte': 'the line beside a finding that says stop',
	'src/lib/components/ui/Notice.svelte': 'the notice of a stop',
	'src/lib/components/ui/StopMark.svelte': 'the shape of a stop',
	'src/lib/components/form/Form.svelte': 'its button raises or takes a call where it is given a grade',
	'src/lib/components/loose-ends/EndMark.svelte': 'a call among the loose ends',
	'src/lib/components/loose-ends/LooseEndRow.svelte':
		'a call among the loose ends, and the button that takes it',
	'src/lib/components/loose-ends/YouWaitFor.svelte': 'a call that one waits for',
	'src/lib/components/patient/EscalationList.svelte': 'the calls about a patient',
	'src/lib/components/patient/FindingList.svelte': 'a finding that says stop',
	'src/lib/components/plot/PointMark.svelte': 'a reading that a finding says stop to',
	'src/lib/components/bedside/FindingLine.svelte': 'a finding that says stop',
	'src/lib/components/bedside/ReadingRow.svelte': 'a reading that a finding says stop to',
	'src/lib/components/bedside/Saved.svelte': 'a session that ended in a stop, and the call that follows',
	'src/lib/components/bedside/StopBar.svelte': 'a stop, and the call that follows',
	'src/lib/components/clearances/Evidence.svelte': 'the calls that a decision is made on',
	'src/lib/components/thread/Entry.svelte': 'a call, as its thread tells it',
	'src/lib/components/ward/WardRow.svelte': 'a call about the patient of the row',
	'src/routes/(app)/patients/[id]/escalate/+page.svelte': 'raising a call, and what comes before it',
	'src/routes/(public)/ExampleThread.svelte': 'a call, in the example of the first page'
};

const isPage = (file: string) =>
	/^src\/(lib\/(components|client)|routes)\//.test(file) && !/paraglide|tokens|\.test\.ts$/.test(file);
const OF_CALLS = /^src\/(lib\/components\/escalations|routes\/style)\//;

const named = () =>
	readdirSync('src', { recursive: true, encoding: 'utf8' })
		.map((file) => `src/${file.replaceAll('\\', '/')}`)
		.filter((file) => /\.(svelte|ts|css)$/.test(file) && isPage(file) && !OF_CALLS.test(file))
		.filter((file) => ALARM.test(readFileSync(file, 'utf8')));

describe('the colours of an alarm', () => {
	it.each([
		'class="text-high"',
		'hover:bg-medium-ground',
		'border-l-low',
		'fill: var(--low)',
		'<Button variant="alarm">',
		"variant={late ? 'alarm' : 'quiet'}",
		'class={GRADE_TEXT.high}',
		'<GradeShape grade="low" />'
	])('are noticed in %s', (line) => expect(line).toMatch(ALARM));

	it.each(["grade === 'high'", 'm.escalations_means_low()', 'class="font-bold text-ink"'])(
		'are not seen where there are none: %s',
		(line) => expect(line).not.toMatch(ALARM)
	);

	it('are for calls for help, stops and findings alone', () => {
		expect(named().toSorted()).toEqual(Object.keys(ALLOWED).toSorted());
	});
});
