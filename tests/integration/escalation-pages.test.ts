import { eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { movesFor } from '$lib/domain/escalations/moves';
import type { Context } from '$lib/server/context';
import { db } from '$lib/server/db';
import { coverShifts, escalationLinks } from '$lib/server/db/schema';
import { chainJob } from '$lib/server/escalations/chain-job';
import { confirmPass, passEscalation } from '$lib/server/escalations/pass';
import { phonePage } from '$lib/server/escalations/phone';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { receiversOf } from '$lib/server/escalations/receivers';
import { takeByLink } from '$lib/server/escalations/link';
import { takeEscalation } from '$lib/server/escalations/take';
import { LINK_LIFE_MS } from '$lib/server/escalations/tell';
import { newId } from '$lib/server/ids';
import { linkToken } from '$lib/server/links';
import { addPatient, addPerson, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const INPUT: RaiseInput = {
	grade: 'high',
	situation: 'Systolic pressure fell from 128 to 108 after walking.',
	background: 'Bypass, day 5.',
	assessment: 'Fall of 20, limit 10.',
	request: 'Please come.'
};
const DAY = 24 * 3600 * 1000;

const hospital = await openHospital();
let id: string;

beforeAll(async () => {
	const { nurse, physician } = hospital.people;
	for (const [post, userId] of [
		['nurse', nurse.id],
		['physician', physician.id]
	] as const) {
		const { now, units } = hospital;
		const shift = { id: newId(), unitId: units.ward, post, userId, startsAt: now - DAY, endsAt: now + DAY };
		await db().insert(coverShifts).values(shift);
	}
});
beforeEach(async () => {
	const { episodeId } = await addPatient({ unitId: hospital.units.ward });
	({ id } = (await raiseEscalation(by('therapist'), episodeId, INPUT)).result);
});

const at = (seconds: number) => hospital.now + seconds * 1000;
const by = (role: 'therapist' | 'nurse' | 'physician', seconds = 0) =>
	contextOf(hospital.people[role], at(seconds));
const nobody = (seconds: number): Context => ({ actor: null, now: at(seconds), address: null, key: null });

/** The token of the newest link that somebody got about this escalation. */
async function tokenOf(userId: string): Promise<string> {
	const links = await db().select().from(escalationLinks).where(eq(escalationLinks.escalationId, id));
	return linkToken(links.findLast((link) => link.userId === userId)?.id ?? '');
}

describe('to whom an escalation can be passed', () => {
	it('lists those of the unit who may take it, those on cover first, and oneself not at all', async () => {
		const receivers = await receiversOf(by('nurse'), id);
		const { physician, surgeon } = hospital.people;
		expect(receivers[0]).toEqual({
			id: physician.id,
			name: physician.name,
			role: 'physician',
			post: 'physician'
		});
		expect(
			receivers
				.slice(1)
				.map((each) => each.id)
				.toSorted()
		).toEqual([hospital.nurse2.id, surgeon.id].toSorted());
		expect(receivers.slice(1).every(({ post }) => post === null)).toBe(true);
	});

	it('leaves out people of other units and accounts that are disabled', async () => {
		const { now, units } = hospital;
		const gone = await addPerson({ role: 'nurse', unitIds: [units.ward], disabledAt: now });
		const far = await addPerson({ role: 'nurse', unitIds: [units.gym] });
		const ids = (await receiversOf(by('nurse'), id)).map((each) => each.id);
		expect(ids).not.toContain(gone.id);
		expect(ids).not.toContain(far.id);
	});

	it('is empty for somebody who could not hold it, and closed to an outsider', async () => {
		await expect(receiversOf(by('therapist'), id)).resolves.toEqual([]);
		const outsider = contextOf(hospital.outsider, at(0));
		await expect(receiversOf(outsider, id)).rejects.toMatchObject({ code: 'not-found' });
	});

	it('offers only people to whom passing works', async () => {
		await takeEscalation(by('nurse', 5), id, null);
		for (const { id: to } of await receiversOf(by('nurse', 6), id)) {
			await expect(passEscalation(by('nurse', 7), id, { to, reason: 'Busy.' })).resolves.toBeDefined();
		}
	});
});

describe('the page of a link', () => {
	it('knows nobody who is not signed in as the person of the link', async () => {
		const token = await tokenOf(hospital.people.nurse.id);
		await expect(phonePage(nobody(10), token)).resolves.toMatchObject({ signedIn: false, now: at(10) });
		await expect(phonePage(by('physician', 10), token)).resolves.toMatchObject({ signedIn: false });
		await expect(phonePage(by('nurse', 10), token)).resolves.toMatchObject({ signedIn: true });
	});

	it('carries neither the patient nor a reading, before and after it is taken', async () => {
		const token = await tokenOf(hospital.people.nurse.id);
		const before = await phonePage(nobody(10), token);
		await takeByLink(nobody(20), token);
		const after = await phonePage(nobody(30), token);
		expect(JSON.stringify([before, after])).not.toMatch(/Quillfeather|128|108|Bypass|Fall of/);
	});

	it('tells which steps were told, and still does once somebody has it', async () => {
		const token = await tokenOf(hospital.people.nurse.id);
		const told = async (seconds: number) =>
			(await phonePage(nobody(seconds), token)).escalation.steps.map((step) => step.told);
		expect(await told(1)).toEqual([true, false, false, false]);
		await chainJob.run(at(130));
		expect(await told(131)).toEqual([true, true, false, false]);
		await takeEscalation(by('nurse', 140), id, null);
		expect(await told(141)).toEqual([true, true, false, false]);
	});

	it('says who has it since when, and who of two that is', async () => {
		const token = await tokenOf(hospital.people.nurse.id);
		await takeByLink(nobody(20), token);
		const { escalation } = await phonePage(nobody(30), token);
		expect(escalation).toMatchObject({
			mine: true,
			usable: false,
			holder: hospital.people.nurse.name,
			takenAt: new Date(at(20)).toISOString(),
			nextAt: null
		});
	});

	it('tells the receiver of a pass that it waits for them, until they confirm', async () => {
		await takeEscalation(by('nurse', 10), id, null);
		await passEscalation(by('nurse', 20), id, { to: hospital.people.physician.id, reason: 'Pressure.' });
		const token = await tokenOf(hospital.people.physician.id);
		const waiting = await phonePage(nobody(30), token);
		expect(waiting.escalation).toMatchObject({ passedToMe: true, mine: false });
		await confirmPass(by('physician', 40), id);
		const confirmed = await phonePage(nobody(50), token);
		expect(confirmed.escalation).toMatchObject({ passedToMe: false, mine: true });
	});

	it.each([
		[LINK_LIFE_MS / 1000 - 1, true],
		[LINK_LIFE_MS / 1000, false]
	])('opens %i s after it was sent: %s', async (seconds, opens) => {
		const token = await tokenOf(hospital.people.nurse.id);
		const page = phonePage(nobody(seconds), token);
		await (opens
			? expect(page).resolves.toBeDefined()
			: expect(page).rejects.toMatchObject({ code: 'not-found' }));
	});

	it('opens nothing for a token that nobody got', async () => {
		await expect(phonePage(nobody(1), 'x'.repeat(22))).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('the page of an escalation', () => {
	it('carries two identifiers, and offers the receiver of a pass to confirm it', async () => {
		await takeEscalation(by('nurse', 10), id, 5);
		await passEscalation(by('nurse', 20), id, { to: hospital.people.physician.id, reason: 'Pressure.' });
		const view = await getEscalation(db(), hospital.people.physician, id);
		expect(view).toMatchObject({
			birthDate: '1958-09-05',
			mrn: expect.stringMatching(/^T-/),
			unitId: hospital.units.ward,
			passReason: 'Pressure.'
		});
		expect(movesFor(view, hospital.people.physician)).toEqual(['confirm']);
		expect(movesFor(view, hospital.people.nurse)).toEqual(['arrive', 'eta', 'pass', 'settle']);
	});
});
