import { expect, test } from '@playwright/test';
import { invite } from './journey/accounts';
import { callAndTake, notice, settle } from './journey/call';
import { closeReferral } from './journey/close';
import { cutAndResume } from './journey/cut';
import { Day } from './journey/day';
import { deviate, tellAndPass } from './journey/pass';
import { followUp, ownPage } from './journey/patient';
import { clear, clearByOthers, refer } from './journey/refer';
import { decideLevel, narrowLimit } from './journey/steps';
import { correctContact, endStay, moveBed } from './journey/stay';
import { declineByText, missAndConfirm, readByPerson, remindAndAttend, stopAndStart } from './journey/texts';
import { bookSeries, mailed, move } from './journey/visits';

/**
 * Every role's whole day in one journey, on the built product: one patient, seven people at browsers of their own, and
 * the patient with a telephone and a mailbox.
 */
let day: Day;

// The scenes build on each other as working days do, so one that fails ends the journey.
test.describe.configure({ mode: 'serial', timeout: 120_000 });

test.beforeAll(async ({ browser }) => {
	test.setTimeout(240_000);
	day = await Day.begin(browser);
});

test.afterAll(() => day?.end());

test('refer: the surgeon asks, the therapist sees it arrive and accepts, both talk, the nurse reads along', () =>
	refer(day));
test('clear: the therapist asks for the arm stage, the surgeon clears it to 90 degrees', () => clear(day));
test('clear: the physician clears the stairs, the speech therapist the swallow', () => clearByOthers(day));
test('notice: the findings show while the therapist types', () => notice(day));
test('escalate: the SMS brings the nurse a link; a look takes nothing; she takes it, goes and settles it', async () => {
	await callAndTake(day);
	await settle(day);
});
test('pass: told in person, taken with one tap, passed on and confirmed', () => tellAndPass(day));
test('deviate: what was done without a clearance is recorded, and the decider has seen it', () =>
	deviate(day));
test('level: the therapist takes it back, and the nurse’s open page says so', () => decideLevel(day));
test('limit: the physician narrows one for this patient', () => narrowLimit(day));
test('the stream is cut and resumes without a gap', () => cutAndResume(day));
test('invite: the administrator invites a nurse, who opens the link from the mailbox', () => invite(day));
test('book: a series steps over a closed day', () => bookSeries(day));
test('mail: a calendar file for the patient, a link for the surgeon', () => mailed(day));
test('move: the patient is told at daytime, colleagues see it at once', () => move(day));
test('page: the patient’s own page without script, a yes and a no', () => ownPage(day));
test('follow up: a no on the page is a loose end until it is seen to', () => followUp(day));
test('remind: the phone is reminded once, and the nurse marks who came', () => remindAndAttend(day));
test('stop: HELP, STOP and START', () => stopAndStart(day));
test('read: a text that no rule understands is a loose end until a person has seen to it', () =>
	readByPerson(day));
test('correct: the coordinator puts consent right', () => correctContact(day));
test('bed: a move to another bed shows on the ward at once', () => moveBed(day));
test('miss: who did not come is marked; YES by text confirms', () => missAndConfirm(day));
test('decline: NO by text cancels', () => declineByText(day));
test('follow up: a no by text is a loose end until it is seen to', () => followUp(day));
test('close: the referral is closed, and the referrer gets a link to how it went', () => closeReferral(day));
test('end: the stay ends, and the link to the patient’s page with it', () => endStay(day));
test('nobody’s browser complained', () => expect(day.complaints).toEqual([]));
