import { expect, test } from '@playwright/test';
import { WIDE } from './access';
import { lostFocus } from './focus';
import { admitPatient, askByName, referPatient } from './keyboard/arrival';
import { clearIt, bookAndSignOut, takeAndSettle } from './keyboard/others';
import { Shift } from './keyboard/shift';
import {
	askForClearance,
	doneInPlace,
	raiseFromStop,
	recordSession,
	replyAndGoOn,
	walkRows
} from './keyboard/therapist';
import { expectConnected, PHONE } from './people';

/**
 * The whole main job by people who have a keyboard and nothing else, on the built product. Each stop of the focus on
 * their way is in view and marked, and no way is longer than one would go.
 */
let shift: Shift;

// The scenes build on each other, so one that fails ends the job.
test.describe.configure({ mode: 'serial' });

test.beforeAll(async ({ browser }) => {
	test.setTimeout(180_000);
	shift = await Shift.begin(browser);
});
test.afterAll(() => shift?.end());

test('admit: the coordinator finds the form on the ward, and fills it in', () => admitPatient(shift));
test('refer: the surgeon finds the patient on the ward, and asks the service', () => referPatient(shift));
test('home: from row to row by arrow keys, and to the first and the last', () => walkRows(shift));
test('deed: a row is done with where it stands, and the row in its place has the focus', () =>
	doneInPlace(shift));
test('question: the surgeon puts one to the therapist in the thread, by name', () => askByName(shift));
test('reply: from the row to the thread, an answer, and on to the patient and the bedside', () =>
	replyAndGoOn(shift));
test('bedside: readings are typed, a rule stops the patient while they are, and all is recorded', () =>
	recordSession(shift));
test('ask: from the session to the thread, and there for a clearance', () => askForClearance(shift));
test('answer: the surgeon clears it to 90 degrees, and the thread says so', () => clearIt(shift));
test('raise: the readings stop the patient again, and the stop leads to the call', () =>
	raiseFromStop(shift));
test('help: the nurse takes the call, is there, and settles it on a sheet', () => takeAndSettle(shift));
test('visit: the coordinator books one, and signs out', () => bookAndSignOut(shift));

test('wider: the tabulator key loses nothing of the bedside, on a phone and then at a desk', async () => {
	const { page } = shift.therapist;
	await page.goto(`/bedside/${shift.episodeId}`);
	await expectConnected(page);
	for (const viewport of [PHONE, WIDE]) {
		await page.setViewportSize(viewport);
		expect(await lostFocus(page)).toEqual([]);
	}
});

test('nobody’s browser complained', () => expect(shift.complaints).toEqual([]));
