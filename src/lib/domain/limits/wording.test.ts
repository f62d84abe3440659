import { describe, expect, it } from 'vitest';
import { ACTIVITIES, activityByCode } from '../bedside/activities/activities';
import { activitiesOf, worded } from '../bedside/activities/local';
import { wordActivityBody } from './forms';
import { wordActivityForm } from './page-forms';
import { fieldsOfLines, linesOfFields } from './wording';

const AGREED = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-02-02' };

describe('the form of an activity', () => {
	it.each(ACTIVITIES.map((activity) => [activity.code, activity] as const))(
		'%s comes back from it as it went in, and is accepted',
		(code, activity) => {
			const { name, dose, howTo, watch, never } = activity;
			const lines = linesOfFields(fieldsOfLines(activity));
			expect(lines).toEqual({ name, needs: [], dose, howTo, watch, never });
			expect(wordActivityBody.safeParse({ code, lines, ...AGREED }).success).toBe(true);
			const form = { code, ...fieldsOfLines(activity), ...AGREED };
			expect(wordActivityForm.safeParse(form).error?.issues ?? []).toEqual([]);
		}
	);

	const fields = fieldsOfLines(activityByCode('hall-walk'));

	it('takes one end alone for one figure, and drops empty rows', () => {
		const lines = linesOfFields({ ...fields, minutesTo: '', watch: ' Pulse. \n\n' });
		expect([lines.dose.minutes, lines.watch]).toEqual([[5, 5], ['Pulse.']]);
	});

	it.each([
		[{ minutesFrom: '0' }, 'Minutes is 0 to 7: it must run from more than 0 to at most 240'],
		[{ minutesFrom: '8', minutesTo: '7' }, 'not end below its start'],
		[{ minutesTo: '241' }, 'at most 240'],
		[{ minutesFrom: '1e' }, 'Minutes, from: “1e” is no number'],
		[{ minutesFrom: '', minutesTo: '1e' }, 'Minutes, to: “1e” is no number'],
		[{ timesADayTo: '25' }, 'Times a day is 3 to 25: it must run from more than 0 to at most 24'],
		[{ never: ' \n ' }, 'Never is empty: it must have 1 to 8 lines'],
		[{ watch: 'a\n'.repeat(9) }, 'Watch has 9 lines, and the limit is 8.'],
		[{ howTo: `a\n${'a'.repeat(201)}` }, 'How, line 2, has 201 characters, and the limit is 200.'],
		[{ name: 'a'.repeat(81) }, 'Name has 81 characters, and the limit is 80.'],
		[{ name: ' ' }, 'Name is empty.'],
		[{ needs: 'a\n'.repeat(9) }, 'Also needed first has 9 lines, and the limit is 8.'],
		[{ agreedBy: '' }, 'Clinical lead is empty.']
	])('refuses %j once, by the words of its labels', (change, message) => {
		const found = wordActivityForm.safeParse({ code: 'hall-walk', ...fields, ...AGREED, ...change });
		expect(found.error?.issues).toHaveLength(1);
		expect(found.error?.issues[0]?.message).toContain(message);
	});

	it.each<[Record<string, unknown> & { dose?: object }, string]>([
		[{ dose: { minutes: [0, 7] } }, 'minutes is 0 to 7: it must run from more than 0 to at most 240'],
		[{ dose: { timesADay: [3, 25] } }, 'timesADay is 3 to 25'],
		[{ never: [] }, 'never is empty: it must have 1 to 8 lines'],
		[{ watch: Array(9).fill('a') }, 'watch has 9 lines, and the limit is 8.'],
		[{ howTo: ['a'.repeat(201)] }, 'a line of howTo has 201 characters, and the limit is 200.']
	])('and its body of the JSON API refuses %j by its own names', ({ dose, ...change }, message) => {
		const lines = linesOfFields(fields);
		const changed = { ...lines, ...change, dose: { ...lines.dose, ...dose } };
		const found = wordActivityBody.safeParse({ code: 'hall-walk', lines: changed, ...AGREED });
		expect(found.error?.issues.map((issue) => issue.message).join()).toContain(message);
	});
});

describe('the words of a unit', () => {
	const lines = { ...linesOfFields(fieldsOfLines(activityByCode('hall-walk'))), howTo: ['Slowly.'] };
	const change = (version: number, over = {}) => ({
		code: 'hall-walk' as const,
		lines,
		version,
		...AGREED,
		...over
	});

	it('take the place of the catalogue’s, are common practice, and open no gate', () => {
		const entry = worded(activityByCode('hall-walk'), [change(1)]);
		expect(entry).toMatchObject({ howTo: ['Slowly.'], source: 'common-practice', local: { version: 1 } });
		const { level, mets, clearance, heldBy, walking } = activityByCode('hall-walk');
		expect(entry).toMatchObject({ level, mets, clearance, heldBy, walking });
	});

	it('the newest counts, and null goes back to the catalogue', () => {
		const entry = worded(activityByCode('hall-walk'), [change(2, { lines: null }), change(1)]);
		expect(entry).toMatchObject({ howTo: activityByCode('hall-walk').howTo, local: null });
	});

	it('may ask for more first, never for less, under a name of their own', () => {
		const more = { ...lines, name: 'Long slides', needs: ['Drain out'] };
		const entry = worded(activityByCode('leg-slides'), [change(1, { code: 'leg-slides', lines: more })]);
		expect(entry).toMatchObject({
			name: 'Long slides',
			needs: ['Day 1 or 2', 'The patient follows commands', 'Drain out']
		});
		expect(fieldsOfLines(entry)).toMatchObject({ name: 'Long slides', needs: 'Drain out' });
	});

	it('of before units had names keep the catalogue’s', () => {
		const { name: _name, needs: _needs, ...old } = lines;
		const entry = worded(activityByCode('hall-walk'), [change(1, { lines: old })]);
		expect(entry).toMatchObject({
			name: activityByCode('hall-walk').name,
			needs: activityByCode('hall-walk').needs
		});
	});

	it('of one activity leave the others alone', () => {
		expect(activitiesOf([change(1)]).filter(({ local }) => local !== null)).toHaveLength(1);
	});
});
