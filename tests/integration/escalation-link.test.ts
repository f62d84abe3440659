import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sql } from 'drizzle-orm';
import type { Context } from '$lib/server/context';
import { db } from '$lib/server/db';
import { chainJob } from '$lib/server/escalations/chain-job';
import { holderJob } from '$lib/server/escalations/holder-job';
import { passEscalation } from '$lib/server/escalations/pass';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { actions, load } from '../../src/routes/(phone)/t/[token]/+page.server';
import { GET } from '../../src/routes/(phone)/t/[token]/state/+server';
import { at, CALL, coverWard, escalationRow, nobody, tokenOf } from '../support/escalations';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let id: string;

beforeAll(async () => {
	await coverWard(hospital);
});
beforeEach(async () => {
	const { episodeId } = await addPatient({ unitId: hospital.units.ward });
	({ id } = (await raiseEscalation(contextOf(hospital.people.therapist, at(0)), episodeId, CALL)).result);
});

/** As much of a request as the handlers look at. */
function request(context: Context, token: string, form: Record<string, string> = {}): never {
	const body = new URLSearchParams(form);
	return {
		locals: { context },
		params: { token },
		url: new URL(`http://127.0.0.1/t/${token}`),
		request: new Request('http://127.0.0.1/t/x', { method: 'POST', body })
	} as never;
}

/** What the one action of the page answers: where it leads, or why not. */
async function post(context: Context, token: string, form: Record<string, string> = {}) {
	try {
		return (await actions.default?.(request(context, token, form))) as { status: number; data: unknown };
	} catch (thrown) {
		return thrown as { status: number; location?: string };
	}
}

async function movesOf(escalationId: string): Promise<string[]> {
	const view = await getEscalation(db(), hospital.people.nurse, escalationId);
	return view.moves.map(({ kind }) => kind);
}

/** Every row of every table that a deed would touch. */
async function everything(): Promise<string> {
	const tables = ['escalations', 'escalation_moves', 'escalation_links', 'audit', 'outbox', 'live_events'];
	const counts = await Promise.all(tables.map((table) => db().all(sql.raw(`select * from ${table}`))));
	return JSON.stringify(counts);
}

describe('looking at a link', () => {
	it.each([
		['without a cookie', () => nobody(10)],
		['signed in as its person', () => contextOf(hospital.people.nurse, at(10))],
		['signed in as somebody else', () => contextOf(hospital.people.physician, at(10))]
	])('%s changes nothing at all', async (_, context) => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		const before = await everything();
		for (let n = 0; n < 3; n += 1) {
			await load(request(context(), token));
			expect((await GET(request(context(), token))).status).toBe(200);
		}
		expect(await everything()).toBe(before);
		expect((await escalationRow(id)).state).toBe('raised');
	});
});

describe('the page of a link, by POST', () => {
	it('takes, gives and changes minutes, and arrives, for its person and without a sign-in', async () => {
		const { nurse } = hospital.people;
		const token = await tokenOf(id, nurse.id);
		expect(await post(nobody(10), token)).toMatchObject({ status: 303, location: `/t/${token}` });
		expect(await escalationRow(id)).toMatchObject({ takenBy: nurse.id, etaMinutes: null });
		await post(nobody(20), token, { deed: 'eta', etaMinutes: '5' });
		expect(await escalationRow(id)).toMatchObject({ etaMinutes: 5, askHolderAt: at(20 + 600) });
		await post(nobody(40), token, { deed: 'eta', etaMinutes: '2' });
		expect(await escalationRow(id)).toMatchObject({ etaMinutes: 2, etaGivenAt: at(40) });
		await post(nobody(60), token, { deed: 'arrive' });
		expect(await escalationRow(id)).toMatchObject({ arrivedAt: at(60), askHolderAt: null });
	});

	it('says nothing about a patient whatever was done', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		await post(nobody(20), token, { deed: 'arrive' });
		const shown = await (await GET(request(nobody(30), token))).text();
		expect(shown).not.toMatch(/Quillfeather|128|108|Bypass|Fall of/);
	});

	it.each([
		['0', 422],
		['1', 303],
		['240', 303],
		['241', 422],
		['soon', 422],
		['2.5', 422]
	])('takes %s minutes: %i', async (etaMinutes, status) => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		expect(await post(nobody(20), token, { deed: 'eta', etaMinutes })).toMatchObject({ status });
	});

	it('knows no other deeds', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		expect(await post(nobody(10), token, { deed: 'settle' })).toMatchObject({ status: 422 });
		expect((await escalationRow(id)).state).toBe('raised');
	});

	it.each(['eta', 'arrive', 'untake', 'confirm'])('%s is not for who does not hold it', async (deed) => {
		const token = await tokenOf(id, hospital.nurse2.id);
		await takeEscalation(contextOf(hospital.people.nurse, at(10)), id, null);
		const before = await escalationRow(id);
		const answer = await post(nobody(12), token, { deed, etaMinutes: '5' });
		expect([403, 409]).toContain(answer.status);
		expect(await escalationRow(id)).toEqual(before);
	});

	it('takes back within five seconds', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		await post(nobody(15), token, { deed: 'untake' });
		expect((await escalationRow(id)).state).toBe('raised');
		await post(nobody(16), token);
		expect(await post(nobody(22), token, { deed: 'untake' })).toMatchObject({ status: 409 });
	});

	it('confirms what was passed to its person', async () => {
		const { nurse, physician } = hospital.people;
		await takeEscalation(contextOf(nurse, at(10)), id, null);
		await passEscalation(contextOf(nurse, at(20)), id, { to: physician.id, reason: 'Pressure.' });
		const token = await tokenOf(id, physician.id);
		await post(nobody(30), token, { deed: 'confirm' });
		expect(await escalationRow(id)).toMatchObject({ takenBy: physician.id, passTo: null });
	});

	it('tells the second of two who take at once, and the first has it', async () => {
		const [one, two] = [await tokenOf(id, hospital.people.nurse.id), await tokenOf(id, hospital.nurse2.id)];
		const answers = await Promise.all([post(nobody(10), one), post(nobody(10), two)]);
		expect(answers.map(({ status }) => status).toSorted()).toEqual([303, 409]);
	});

	it('does each deed once when its form is sent twice, with the key that the page gave it', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		const { keys } = (await load(request(nobody(5), token))) as { keys: Record<string, string> };
		expect(new Set(Object.values(keys)).size).toBe(5);
		const forms: [string, Record<string, string>][] = [
			['take', {}],
			['eta', { etaMinutes: '5' }],
			['arrive', {}]
		];
		for (const [deed, fields] of forms) {
			const keyed = { ...fields, deed, key: keys[deed] ?? '' };
			for (const second of [10, 20]) {
				expect(await post(nobody(second), token, keyed)).toMatchObject({ status: 303 });
			}
		}
		expect(await movesOf(id)).toEqual(['raised', 'taken', 'eta', 'arrived']);
	});

	it('does a deed once when two presses come at the same moment, and both lead back to the page', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		const form = { deed: 'eta', etaMinutes: '5', key: 'one-press' };
		const answers = await Promise.all([post(nobody(20), token, form), post(nobody(20), token, form)]);
		expect(answers).toMatchObject([{ status: 303 }, { status: 303 }]);
		expect(await movesOf(id)).toEqual(['raised', 'taken', 'eta']);
	});

	it('arrives once even without a key: the second leads back to the page', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		for (const second of [20, 30]) {
			expect(await post(nobody(second), token, { deed: 'arrive' })).toMatchObject({ status: 303 });
		}
		expect(await movesOf(id)).toEqual(['raised', 'taken', 'arrived']);
		expect((await escalationRow(id)).arrivedAt).toBe(at(20));
	});

	it('takes other minutes under the same key for a mistake, and does not keep the secret of the link', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		await post(nobody(20), token, { deed: 'eta', etaMinutes: '5', key: 'k' });
		const other = await post(nobody(21), token, { deed: 'eta', etaMinutes: '9', key: 'k' });
		expect(other.status).toBeGreaterThanOrEqual(400);
		expect((await escalationRow(id)).etaMinutes).toBe(5);
		const kept = await db().all(sql.raw('select * from idempotency_keys'));
		expect(kept.length).toBeGreaterThan(0);
		expect(JSON.stringify(kept)).not.toContain(token);
	});

	it('takes once: who did not come does not take again with the same link', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		await post(nobody(10), token);
		for (const second of [610, 670]) {
			await holderJob.run(at(second));
		}
		await chainJob.run(at(670));
		const before = await escalationRow(id);
		expect(before.nextStepAt).not.toBeNull();
		await post(nobody(680), token);
		expect(await escalationRow(id)).toEqual(before);
	});

	it('does nothing once it has expired', async () => {
		const token = await tokenOf(id, hospital.people.nurse.id);
		expect(await post(nobody(12 * 3600), token)).toMatchObject({ status: 404 });
		expect((await escalationRow(id)).state).toBe('raised');
	});
});
