import { eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { toRfc3339 } from '$lib/domain/core/instant';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { chainJob } from '$lib/server/escalations/chain-job';
import { holderJob } from '$lib/server/escalations/holder-job';
import { arriveAtEscalation, giveEtaOf } from '$lib/server/escalations/arrive';
import { settleEscalation } from '$lib/server/escalations/end';
import { confirmPass, passEscalation } from '$lib/server/escalations/pass';
import { takeByLink, untakeByLink } from '$lib/server/escalations/link';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { untakeEscalation } from '$lib/server/escalations/undo';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { recheck } from '$lib/server/outbox/recheck';
import { releaseRow } from '$lib/server/outbox/record';
import {
	at,
	CALL,
	coverWard,
	deliverAll,
	escalationRow,
	messagesOf,
	nobody,
	tokenOf,
	toldOf
} from '../support/escalations';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;

beforeAll(async () => {
	await coverWard(hospital);
});
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const by = (role: 'therapist' | 'nurse' | 'physician' | 'surgeon', seconds = 0) =>
	contextOf(hospital.people[role], at(seconds));
const raise = async (seconds = 0, input: Partial<typeof CALL> = {}) =>
	(await raiseEscalation(by('therapist', seconds), episodeId, { ...CALL, ...input })).result.id;

const setMessage = (id: string | undefined, change: Partial<typeof outbox.$inferSelect>) =>
	db()
		.update(outbox)
		.set(change)
		.where(eq(outbox.id, id ?? ''));

/** Everything that is due by this second, as the clockwork does it. */
async function beat(seconds: number): Promise<void> {
	let done: number;
	do {
		done = (await chainJob.run(at(seconds))) + (await holderJob.run(at(seconds)));
	} while (done > 0);
}
const kindsOf = async (role: 'nurse' | 'physician', id: string, seconds: number) => {
	const { mine } = await looseEndsOf(db(), hospital.people[role], at(seconds));
	return mine.filter((end) => end.id === id).map(({ kind }) => kind);
};

describe('a call that says by when somebody is needed', () => {
	// Of a medium one both nurses are told again after ten minutes, and a holder is asked after thirty.
	const needed = (seconds: number) => ({ grade: 'medium', neededBy: toRfc3339(at(seconds)) }) as const;
	const stepsOf = async (id: string) =>
		(await getEscalation(db(), hospital.people.nurse, id)).steps.map(({ step }) => step);

	it('tells the next ones at that moment when nobody has it, and then keeps to the plan', async () => {
		const id = await raise(0, needed(300));
		await beat(299);
		expect(new Set(await stepsOf(id))).toEqual(new Set([0]));
		await beat(300);
		expect(new Set(await stepsOf(id))).toEqual(new Set([0, 1]));
		await beat(1799);
		expect(new Set(await stepsOf(id))).toEqual(new Set([0, 1]));
		await beat(1800);
		expect(new Set(await stepsOf(id))).toEqual(new Set([0, 1, 2]));
	});

	it('keeps the plan where the plan is sooner', async () => {
		const id = await raise(0, needed(601));
		await beat(600);
		expect((await escalationRow(id)).nextStepAt).toBe(at(601));
	});

	it('asks the holder at that moment, and goes on without an answer', async () => {
		const id = await raise(0, needed(300));
		await takeEscalation(by('nurse', 30), id, null);
		await beat(299);
		expect((await escalationRow(id)).holderAskedAt).toBeNull();
		await beat(300);
		expect((await escalationRow(id)).holderAskedAt).toBe(at(300));
		await beat(600);
		expect((await escalationRow(id)).nextStepAt).not.toBeNull();
	});

	it('is moved by a second caller who needs somebody sooner', async () => {
		const id = await raise(0, needed(500));
		await raise(10, needed(200));
		await beat(200);
		expect(new Set(await stepsOf(id))).toEqual(new Set([0, 1]));
	});
});

describe('a holder who is not at the bedside', () => {
	// Taken at 30 s. Minutes given + 5, or 10 without; the chain goes on a minute after the question.
	it.each([
		['none given, just before ten minutes', null, 30 + 600 - 1, 'taken'],
		['none given, at ten minutes', null, 30 + 600, 'asked'],
		['none given, just before the minute to answer ends', null, 30 + 659, 'asked'],
		['none given, when it ends', null, 30 + 660, 'went-on'],
		['three given, just before eight minutes', 3, 30 + 479, 'taken'],
		['three given, at eight minutes', 3, 30 + 480, 'asked'],
		['three given, a minute later', 3, 30 + 540, 'went-on']
	])('%s', async (_, eta, seconds, newest) => {
		const id = await raise();
		await takeEscalation(by('nurse', 30), id, eta);
		for (const second of [300, seconds - 60, seconds - 1, seconds]) {
			await beat(second);
		}
		const view = await getEscalation(db(), hospital.people.nurse, id);
		expect(view.moves.at(-1)?.kind).toBe(newest);
		expect(view).toMatchObject({ state: 'taken', holder: { id: hospital.people.nurse.id } });
	});

	it('is asked by a message that leaves, and by a loose end that one tap closes', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 0), id, null);
		await beat(600);
		const asked = (await messagesOf(id)).filter((message) => message.createdAt === at(600));
		expect(asked).toMatchObject([{ userId: hospital.people.nurse.id, state: 'ready' }]);
		expect(asked[0]?.body).toBe('Ropewalk HIGH: Tern Ward: are you there? Else others are told. {link}');
		await expect(recheck(db(), asked[0] as never, at(601))).resolves.toMatchObject({ kind: 'send' });
		expect(await kindsOf('nurse', id, 601)).toEqual(['arrival']);
		await arriveAtEscalation(by('nurse', 602), id);
		expect(await kindsOf('nurse', id, 603)).toEqual(['escalation-taken']);
		await expect(recheck(db(), asked[0] as never, at(603))).resolves.toMatchObject({ kind: 'skip' });
		await beat(3600);
		expect(await toldOf(id)).toEqual(['0:nurse', '0:nurse-in-charge']);
	});

	it('lets the chain go on from where it stood, at its own distances, without the holder', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 30), id, null);
		const table: [number, string[]][] = [
			[690, ['1:nurse-in-charge']],
			[749, []],
			[750, ['2:physician']],
			[1049, []],
			[1050, ['3:surgeon']],
			[1350, ['4:nurse-in-charge', '4:physician', '4:surgeon']]
		];
		await beat(630);
		const expected = ['0:nurse', '0:nurse-in-charge'];
		for (const [second, more] of table) {
			await beat(second);
			expected.push(...more);
			expect(await toldOf(id)).toEqual(expected);
		}
	});

	it('stays the holder until another takes it, who then has their own time', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 0), id, null);
		await expect(takeEscalation(by('physician', 659), id, null)).rejects.toMatchObject({
			code: 'already-taken'
		});
		await beat(600);
		await beat(660);
		expect(await kindsOf('physician', id, 661)).toEqual(['escalation']);
		await expect(takeEscalation(by('nurse', 661), id, null)).rejects.toMatchObject({ code: 'already-taken' });
		await takeEscalation(by('physician', 662), id, 4);
		expect(await escalationRow(id)).toMatchObject({
			takenBy: hospital.people.physician.id,
			nextStepAt: null,
			holderAskedAt: null,
			askHolderAt: at(662 + 9 * 60)
		});
	});

	it('who answers with minutes is waited for anew, until the chain has gone on', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 0), id, null);
		await beat(600);
		await giveEtaOf(by('nurse', 630), id, 2);
		await beat(660);
		expect(await escalationRow(id)).toMatchObject({ holderAskedAt: null, askHolderAt: at(630 + 7 * 60) });
		await beat(1050);
		await beat(1110);
		await giveEtaOf(by('nurse', 1111), id, 1);
		expect((await escalationRow(id)).nextStepAt).not.toBeNull();
		await arriveAtEscalation(by('nurse', 1120), id);
		expect((await escalationRow(id)).nextStepAt).toBeNull();
	});

	it('is asked and passed by in one round after a stop that outlasted both', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 0), id, null);
		await beat(3600);
		const { moves } = await getEscalation(db(), hospital.people.nurse, id);
		expect(moves.slice(-2).map(({ kind }) => kind)).toEqual(['asked', 'went-on']);
	});

	// Common practice, no published source: thirty minutes and five to answer; four hours and thirty minutes.
	it.each([
		['medium', null, 30 * 60, 5 * 60],
		['medium', 20, 50 * 60, 5 * 60],
		['low', null, 240 * 60, 30 * 60]
	] as const)(
		'of a %s one, %s minutes given, is asked and then passed by',
		async (grade, eta, ask, answer) => {
			const id = await raise(0, { grade });
			await takeEscalation(by('nurse', 0), id, eta);
			const newest = async () => (await getEscalation(db(), hospital.people.nurse, id)).moves.at(-1)?.kind;
			for (const [second, kind] of [
				[ask - 1, 'taken'],
				[ask, 'asked'],
				[ask + answer - 1, 'asked'],
				[ask + answer, 'went-on']
			] as const) {
				await beat(second);
				expect(await newest()).toBe(kind);
			}
			expect(await kindsOf('physician', id, ask + answer)).toEqual(['escalation']);
			await takeEscalation(by('physician', ask + answer), id, null);
			expect((await escalationRow(id)).takenBy).toBe(hospital.people.physician.id);
		}
	);

	it('is not at the bedside twice, nor asked there', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 1), id, null);
		await arriveAtEscalation(by('nurse', 60), id);
		const before = await escalationRow(id);
		for (const again of [arriveAtEscalation(by('nurse', 90), id), giveEtaOf(by('nurse', 90), id, 5)]) {
			await expect(again).rejects.toMatchObject({ code: 'wrong-state' });
		}
		expect(await escalationRow(id)).toEqual(before);
	});

	it('is not asked once it is settled', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 1), id, null);
		await settleEscalation(by('nurse', 60), id, { outcome: 'Better', note: 'Rest.' });
		expect(await escalationRow(id)).toMatchObject({ askHolderAt: null, nextStepAt: null, nextStep: null });
		await beat(7200);
		expect(await toldOf(id)).toHaveLength(2);
	});
});

describe('a graver call about one that somebody has', () => {
	it('raises its grade and starts its chain again; the holder keeps it and hears of it', async () => {
		const id = await raise(0, { grade: 'medium' });
		await takeEscalation(by('nurse', 10), id, 5);
		const { result } = await raiseEscalation(by('therapist', 60), episodeId, CALL);
		expect(result).toMatchObject({ id, state: 'taken', bundled: true });
		const row = await escalationRow(id);
		expect(row).toMatchObject({ grade: 'high', takenBy: hospital.people.nurse.id, chainStartedAt: at(60) });
		const told = (await messagesOf(id)).filter((message) => message.createdAt === at(60));
		expect(told.map(({ userId }) => userId)).toEqual([hospital.people.nurse.id, hospital.nurse2.id]);
		await beat(240);
		expect(await toldOf(id)).toContain('2:physician');
		await takeEscalation(by('nurse', 250), id, null);
		expect(await escalationRow(id)).toMatchObject({ nextStepAt: null, askHolderAt: at(850) });
	});

	it('of the same grade is a call of its own', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 10), id, null);
		expect(await raise(60)).not.toBe(id);
	});
});

describe('taking back', () => {
	it.each([
		['at once', 0, true],
		['at five seconds', 5, true],
		['just over', 5.001, false]
	])('%s', async (_, seconds, works) => {
		const id = await raise();
		await takeEscalation(by('nurse', 30), id, 2);
		const undone = untakeEscalation(by('nurse', 30 + seconds), id);
		await (works
			? expect(undone).resolves.toMatchObject({ result: { state: 'raised' } })
			: expect(undone).rejects.toMatchObject({ code: 'wrong-state' }));
	});

	it('lets the chain go on as if nothing had been, with the messages that the taking stopped', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 30), id, 2);
		expect((await messagesOf(id)).map(({ state }) => state)).toEqual(['cancelled', 'cancelled']);
		await untakeEscalation(by('nurse', 33), id);
		expect((await messagesOf(id)).map(({ state }) => state)).toEqual(['ready', 'ready']);
		expect(await escalationRow(id)).toMatchObject({
			state: 'raised',
			takenBy: null,
			askHolderAt: null,
			nextStepAt: at(120)
		});
		await beat(120);
		expect(await toldOf(id)).toContain('1:nurse');
	});

	it('sends what was on its way out and was let go because somebody had it, and nothing else', async () => {
		const id = await raise();
		const [inHand, other] = await messagesOf(id);
		await setMessage(inHand?.id, { state: 'sending', leaseOwner: 'worker', leaseUntil: at(90) });
		await setMessage(other?.id, { state: 'skipped', stateReason: 'account disabled' });
		await takeEscalation(by('nurse', 30), id, null);
		const row = (await messagesOf(id)).find((message) => message.id === inHand?.id) as never;
		const verdict = await recheck(db(), row, at(31));
		expect(verdict.kind).toBe('skip');
		const reason = verdict.kind === 'skip' ? verdict.reason : null;
		await releaseRow(row, 'worker', at(31), { state: 'skipped', reason });
		await untakeEscalation(by('nurse', 33), id);
		expect(await messagesOf(id)).toMatchObject([
			{ id: inHand?.id, state: 'ready', stateReason: null, nextAt: at(33) },
			{ id: other?.id, state: 'skipped', stateReason: 'account disabled' }
		]);
	});

	it('works by the link that took it, which then takes once more', async () => {
		const id = await raise();
		const token = await tokenOf(id, hospital.people.nurse.id);
		await takeByLink(nobody(10), token);
		await untakeByLink(nobody(12), token);
		expect((await escalationRow(id)).state).toBe('raised');
		await takeByLink(nobody(20), token);
		expect((await escalationRow(id)).takenBy).toBe(hospital.people.nurse.id);
	});

	it('gives it back to the holder whom it was taken over from', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 0), id, null);
		await beat(600);
		await beat(660);
		const before = await escalationRow(id);
		await takeEscalation(by('physician', 662), id, null);
		await untakeEscalation(by('physician', 663), id);
		expect(await escalationRow(id)).toEqual(before);
	});

	it('is for the taker alone, and not after something has happened', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 0), id, null);
		await expect(untakeEscalation(by('physician', 1), id)).rejects.toMatchObject({ code: 'wrong-state' });
		await arriveAtEscalation(by('nurse', 2), id);
		await expect(untakeEscalation(by('nurse', 3), id)).rejects.toMatchObject({ code: 'wrong-state' });
	});
});

describe('those who were told', () => {
	const notices = async (id: string) => (await messagesOf(id)).filter(({ kind }) => kind === 'notice');

	it('hear once, by role and without a link, that somebody has it; the taker does not', async () => {
		const id = await raise();
		await deliverAll(id);
		await takeEscalation(by('nurse', 60), id, 2);
		const sent = await notices(id);
		expect(sent).toMatchObject([{ userId: hospital.nurse2.id, linkId: null, nextAt: at(65) }]);
		expect(sent[0]?.body).toBe('Ropewalk HIGH: Tern Ward: a nurse has it. You need do nothing.');
		await expect(recheck(db(), sent[0] as never, at(65))).resolves.toMatchObject({ kind: 'send' });
	});

	it.each([
		['nothing had left', 'high', false, 0],
		['it is low', 'low', true, 0],
		['it is medium', 'medium', true, 1]
	] as const)('when %s', async (_, grade, delivered, count) => {
		const id = await raise(0, { grade });
		if (delivered) {
			await deliverAll(id);
		}
		await takeEscalation(by('nurse', 60), id, null);
		expect(await notices(id)).toHaveLength(count);
	});

	it('do not hear of a taking that was taken back', async () => {
		const id = await raise();
		await deliverAll(id);
		await takeEscalation(by('nurse', 60), id, null);
		await untakeEscalation(by('nurse', 64), id);
		expect(await notices(id)).toMatchObject([{ state: 'cancelled', stateReason: 'taken back' }]);
	});

	it('who took it over in the meantime is not told that another has it', async () => {
		const id = await raise();
		await deliverAll(id);
		await takeEscalation(by('nurse', 60), id, null);
		const [notice] = await notices(id);
		await passEscalation(by('nurse', 61), id, { to: hospital.nurse2.id, reason: 'Busy.' });
		await confirmPass(contextOf(hospital.nurse2, at(62)), id);
		await expect(recheck(db(), notice as never, at(65))).resolves.toEqual({
			kind: 'skip',
			reason: 'nobody else has the escalation'
		});
	});

	it('are not told any more by what had not left: the reason is on record', async () => {
		const id = await raise();
		await takeEscalation(by('nurse', 1), id, null);
		const rows = await db().select().from(outbox).where(eq(outbox.refId, id));
		expect(rows.map(({ state, stateReason }) => [state, stateReason])).toEqual([
			['cancelled', 'taken'],
			['cancelled', 'taken']
		]);
	});
});
