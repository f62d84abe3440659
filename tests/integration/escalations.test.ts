import { eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Post } from '$lib/domain/core/codes';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { db } from '$lib/server/db';
import {
	coverShifts,
	escalationLinks,
	escalations,
	escalationSteps,
	outbox,
	users
} from '$lib/server/db/schema';
import { chainJob } from '$lib/server/escalations/chain-job';
import { settleEscalation } from '$lib/server/escalations/end';
import { passEscalation, confirmPass } from '$lib/server/escalations/pass';
import { getByLink, getEscalation } from '$lib/server/escalations/queries';
import { recordSession } from '$lib/server/bedside/actions';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeByLink } from '$lib/server/escalations/link';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { linkToken } from '$lib/server/links';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionBody } from '../support/session';

const INPUT: RaiseInput = {
	grade: 'high',
	situation: 'Systolic pressure fell from 128 to 108 after walking.',
	background: 'Bypass, day 5.',
	assessment: 'Fall of 20, limit 10.',
	request: 'Please come.'
};
const YEAR = 365 * 24 * 3600 * 1000;

const hospital = await openHospital();
let episodeId: string;

beforeAll(async () => {
	const { nurse, physician, surgeon } = hospital.people;
	const posts: [Post, string][] = [
		['nurse', nurse.id],
		['nurse-in-charge', hospital.nurse2.id],
		['physician', physician.id],
		['surgeon', surgeon.id]
	];
	for (const [post, userId] of posts) {
		const { now, units } = hospital;
		const shift = { id: newId(), unitId: units.ward, post, userId, startsAt: now - YEAR, endsAt: now + YEAR };
		await db().insert(coverShifts).values(shift);
	}
});
// One untaken escalation a patient: every test has a patient of its own.
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const at = (seconds: number) => hospital.now + seconds * 1000;
const by = (role: 'therapist' | 'nurse' | 'physician' | 'surgeon', seconds = 0) =>
	contextOf(hospital.people[role], at(seconds));

async function raise(input: Partial<RaiseInput> = {}, seconds = 0) {
	return (await raiseEscalation(by('therapist', seconds), episodeId, { ...INPUT, ...input })).result;
}

/** Who was told by which step, as `step:name of post`. */
async function told(id: string): Promise<string[]> {
	const rows = await db().select().from(escalationSteps).where(eq(escalationSteps.escalationId, id));
	return rows.map((row) => `${row.step}:${row.post}${row.userId ? '' : ' (nobody)'}`);
}

const messagesOf = (id: string) => db().select().from(outbox).where(eq(outbox.refId, id));

describe('raising', () => {
	it('tells the nurse and the nurse in charge in the same transaction', async () => {
		const { id, state, chain } = await raise();
		expect(state).toBe('raised');
		expect(chain[0]).toEqual({ step: 0, afterSeconds: 0, post: 'nurse' });
		expect(await told(id)).toEqual(['0:nurse', '0:nurse-in-charge']);
		const messages = await messagesOf(id);
		expect(messages.map((m) => m.userId).toSorted()).toEqual(
			[hospital.people.nurse.id, hospital.nurse2.id].toSorted()
		);
	});

	it('puts unit, bed, grade and a link into the message and nothing of the patient', async () => {
		const { id } = await raise();
		const [message] = await messagesOf(id);
		expect(message?.body).toContain('Tern Ward');
		expect(message?.body).toContain('{link}');
		expect(message?.body).not.toMatch(/Quillfeather|128|108|pressure|bypass/i);
	});

	it('takes new facts into the untaken one of the same patient', async () => {
		const first = await raise({ grade: 'medium' });
		const second = await raise({ grade: 'medium', situation: 'Dizzy.' }, 30);
		expect(second).toMatchObject({ id: first.id, bundled: true });
		const [row] = await db().select().from(escalations).where(eq(escalations.id, first.id));
		expect(row?.situation).toBe(INPUT.situation);
		expect(await told(first.id)).toEqual(['0:nurse', '0:nurse-in-charge']);
	});

	it('starts the chain again when the new facts are graver', async () => {
		const first = await raise({ grade: 'medium' });
		await raise({ grade: 'high' }, 60);
		const [row] = await db().select().from(escalations).where(eq(escalations.id, first.id));
		expect(row).toMatchObject({ grade: 'high', chainStartedAt: at(60), nextStepAt: at(180) });
		expect(await messagesOf(first.id)).toHaveLength(4);
	});

	it('goes on to the next post at once when nobody covers the first', async () => {
		const lone = await addPatient({ unitId: hospital.units.icu });
		const { id } = (await raiseEscalation(by('therapist'), lone.episodeId, INPUT)).result;
		const steps = await told(id);
		expect(steps).toContain('0:nurse (nobody)');
		expect(steps).toContain('3:surgeon (nobody)');
		const [row] = await db().select().from(escalations).where(eq(escalations.id, id));
		expect(row?.nextStepAt).toBe(at(780));
	});

	it('does not tell the raiser of their own call', async () => {
		const { id } = (await raiseEscalation(by('nurse'), episodeId, INPUT)).result;
		expect(await told(id)).toEqual(['0:nurse-in-charge']);
	});

	it('refuses a session of another patient, and tells nobody', async () => {
		const other = await addPatient({ unitId: hospital.units.ward });
		const { result } = await recordSession(by('therapist'), other.episodeId, sessionBody());
		await expect(raise({ sessionId: result.id })).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: '/sessionId' }] }
		});
		expect(await db().select().from(escalations).where(eq(escalations.episodeId, episodeId))).toEqual([]);
		const own = await raiseEscalation(by('therapist'), other.episodeId, { ...INPUT, sessionId: result.id });
		expect(own.result.state).toBe('raised');
	});

	it.each([
		['sessionId', { sessionId: 'another' }],
		['toldInPerson', { toldInPerson: 'nobody' }]
	])('names %s when it fits nothing', async (field, input) => {
		await expect(raise(input)).rejects.toMatchObject({
			code: 'invalid',
			extra: { errors: [{ pointer: `/${field}` }] }
		});
	});
});

describe('the chain', () => {
	it.each([
		['nothing more just before two minutes', 119, []],
		['the nurses again at two minutes', 120, ['1:nurse', '1:nurse-in-charge']],
		['and the physician at three', 180, ['1:nurse', '1:nurse-in-charge', '2:physician']],
		['and the surgeon at eight', 480, ['1:nurse', '1:nurse-in-charge', '2:physician', '3:surgeon']]
	])('tells %s', async (_, seconds, more) => {
		const { id } = await raise();
		await chainJob.run(at(seconds));
		expect(await told(id)).toEqual(['0:nurse', '0:nurse-in-charge', ...more]);
	});

	it('tells nobody twice when it is asked twice', async () => {
		const { id } = await raise();
		await chainJob.run(at(120));
		await chainJob.run(at(120));
		expect(await told(id)).toHaveLength(4);
	});

	it('repeats to everybody at its end, and the page says so', async () => {
		const { id } = await raise();
		await chainJob.run(at(480));
		await chainJob.run(at(780));
		expect((await told(id)).slice(-4)).toEqual(['4:nurse', '4:nurse-in-charge', '4:physician', '4:surgeon']);
		expect(await getEscalation(db(), hospital.people.nurse, id)).toMatchObject({ chainSpent: true });
	});

	it('stops when somebody takes it, and so do messages that have not left', async () => {
		const { id } = await raise();
		await takeEscalation(by('nurse', 60), id, 2);
		await chainJob.run(at(500));
		expect(await told(id)).toHaveLength(2);
		expect((await messagesOf(id)).map((m) => m.state)).toEqual(['cancelled', 'cancelled']);
	});

	it('does not tell an account that was disabled meanwhile', async () => {
		const { id } = await raise();
		const physician = eq(users.id, hospital.people.physician.id);
		await db()
			.update(users)
			.set({ disabledAt: at(100) })
			.where(physician);
		await chainJob.run(at(180));
		await db().update(users).set({ disabledAt: null }).where(physician);
		expect(await told(id)).toContain('2:physician (nobody)');
	});
});

describe('taking', () => {
	it('has one holder of two who take at once, and tells the other who', async () => {
		for (let round = 0; round < 20; round += 1) {
			({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
			const { id } = await raise();
			const answers = await Promise.allSettled([
				takeEscalation(by('nurse', 5), id, null),
				takeEscalation(by('physician', 5), id, null)
			]);
			const won = answers.filter((answer) => answer.status === 'fulfilled');
			expect(won).toHaveLength(1);
			expect(answers.find((answer) => answer.status === 'rejected')).toMatchObject({
				reason: {
					code: 'already-taken',
					extra: { takenBy: { id: won[0]?.value.result.takenBy.id }, takenAt: '2026-03-03T09:00:05.000Z' }
				}
			});
		}
	});

	it.each(['therapist', 'coordinator', 'admin', 'speech-therapist'] as const)(
		'is not for a %s',
		async (role) => {
			const { id } = await raise();
			const taken = takeEscalation(contextOf(hospital.people[role]), id, null);
			await expect(taken).rejects.toMatchObject({ code: 'not-allowed' });
		}
	);

	it('looks like nothing to somebody of another unit', async () => {
		const { id } = await raise();
		const taken = takeEscalation(contextOf(hospital.outsider), id, null);
		await expect(taken).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('the secret link', () => {
	async function linkOfNurse(id: string): Promise<string> {
		const links = await db().select().from(escalationLinks).where(eq(escalationLinks.escalationId, id));
		return linkToken(links.find((link) => link.userId === hospital.people.nurse.id)?.id ?? '');
	}
	const anyone = (seconds: number) => ({ actor: null, now: at(seconds), address: null, key: null });

	it('shows unit, bed and grade, no name, and takes nothing', async () => {
		const { id } = await raise();
		const token = await linkOfNurse(id);
		const shown = await getByLink(db(), token, at(10));
		expect(shown).toMatchObject({ unit: 'Tern Ward', grade: 'high', state: 'raised', usable: true });
		expect(JSON.stringify(shown)).not.toMatch(/Quillfeather|128/);
		expect(await getEscalation(db(), hospital.people.nurse, id)).toMatchObject({
			state: 'raised',
			holder: null
		});
	});

	it('takes for its person, once', async () => {
		const { id } = await raise();
		const token = await linkOfNurse(id);
		const { result } = await takeByLink(anyone(20), token);
		expect(result.takenBy.id).toBe(hospital.people.nurse.id);
		await expect(takeByLink(anyone(21), token)).rejects.toMatchObject({ code: 'already-taken' });
	});

	it.each([
		['just before it expires', 12 * 3600 - 1, true],
		['when it expires', 12 * 3600, false]
	])('works %s: %s', async (_, seconds, works) => {
		const { id } = await raise();
		const token = await linkOfNurse(id);
		const outcome = await takeByLink(anyone(seconds), token).then(
			() => true,
			() => false
		);
		expect(outcome).toBe(works);
	});

	it('is worth nothing once its person is disabled', async () => {
		const { id } = await raise();
		const token = await linkOfNurse(id);
		const nurse = eq(users.id, hospital.people.nurse.id);
		await db()
			.update(users)
			.set({ disabledAt: at(1) })
			.where(nurse);
		await expect(takeByLink(anyone(2), token)).rejects.toMatchObject({ code: 'not-found' });
		await db().update(users).set({ disabledAt: null }).where(nurse);
	});

	it('that nobody made is not there', async () => {
		await expect(takeByLink(anyone(1), 'no-such-token')).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('after taking', () => {
	it('only the holder settles, and a re-check becomes due', async () => {
		const { id } = await raise();
		await takeEscalation(by('nurse', 60), id, null);
		const input = { outcome: 'Pressure back', note: '122/70 after five minutes.', recheckMinutes: 15 };
		await expect(settleEscalation(by('physician', 300), id, input)).rejects.toMatchObject({
			code: 'not-allowed'
		});
		expect((await settleEscalation(by('nurse', 300), id, input)).result.state).toBe('settled');
		const shown = await getEscalation(db(), hospital.people.therapist, id);
		expect(shown.recheckDueAt).toBe('2026-03-03T09:20:00.000Z');
	});

	it('an untaken one cannot be settled', async () => {
		const { id } = await raise();
		const settled = settleEscalation(by('nurse', 10), id, { outcome: 'x', note: 'y' });
		await expect(settled).rejects.toMatchObject({ code: 'wrong-state', extra: { state: 'raised' } });
	});

	it('the giver of a pass has it until the receiver confirms', async () => {
		const { id } = await raise();
		await takeEscalation(by('nurse', 10), id, null);
		await passEscalation(by('nurse', 20), id, {
			to: hospital.people.physician.id,
			reason: 'Needs a doctor.'
		});
		const between = await getEscalation(db(), hospital.people.nurse, id);
		expect(between).toMatchObject({
			holder: { id: hospital.people.nurse.id },
			passTo: { id: hospital.people.physician.id }
		});
		await expect(confirmPass(by('surgeon', 25), id)).rejects.toMatchObject({ code: 'not-allowed' });
		await confirmPass(by('physician', 30), id);
		expect(await getEscalation(db(), hospital.people.nurse, id)).toMatchObject({
			holder: { id: hospital.people.physician.id },
			passTo: null
		});
	});
});
