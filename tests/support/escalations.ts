import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import type { Post } from '$lib/domain/core/codes';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import type { Context } from '$lib/server/context';
import { db } from '$lib/server/db';
import { coverShifts, escalationLinks, escalations, escalationSteps, outbox } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { linkToken } from '$lib/server/links';
import { HOSPITAL_NOW, type Hospital } from './hospital';

const YEAR = 365 * 24 * 3600 * 1000;

export const CALL: RaiseInput = {
	grade: 'high',
	situation: 'Systolic pressure fell from 128 to 108 after walking.',
	background: 'Bypass, day 5.',
	assessment: 'Fall of 20, limit 10.',
	request: 'Please come.'
};

/** So many seconds after the hospital's beginning, milliseconds UTC. */
export const at = (seconds: number) => HOSPITAL_NOW + seconds * 1000;

/** A request without a sign-in, as the holder of a link makes it. */
export const nobody = (seconds: number): Context => ({
	actor: null,
	now: at(seconds),
	address: null,
	key: null
});

/** The four posts of the ward, each with a person of its own, day and night. */
export async function coverWard({ units, people, nurse2 }: Hospital): Promise<void> {
	const posts: [Post, Person][] = [
		['nurse', people.nurse],
		['nurse-in-charge', nurse2],
		['physician', people.physician],
		['surgeon', people.surgeon]
	];
	for (const [post, { id: userId }] of posts) {
		const [startsAt, endsAt] = [HOSPITAL_NOW - YEAR, HOSPITAL_NOW + YEAR];
		await db()
			.insert(coverShifts)
			.values({ id: newId(), unitId: units.ward, post, userId, startsAt, endsAt });
	}
}

export async function escalationRow(id: string) {
	const [row] = await db().select().from(escalations).where(eq(escalations.id, id));
	if (!row) {
		throw new Error(`There is no escalation ${id}.`);
	}
	return row;
}

/** Who was told by which step, as `step:post`. */
export async function toldOf(id: string): Promise<string[]> {
	const rows = await db().select().from(escalationSteps).where(eq(escalationSteps.escalationId, id));
	return rows.map((row) => `${row.step}:${row.post}${row.userId ? '' : ' (nobody)'}`);
}

export const messagesOf = (id: string) => db().select().from(outbox).where(eq(outbox.refId, id));

/** The messages have left and arrived, as if the gateway had said so. */
export async function deliverAll(id: string): Promise<void> {
	await db().update(outbox).set({ state: 'delivered' }).where(eq(outbox.refId, id));
}

/** The token of the newest link that somebody got about an escalation. */
export async function tokenOf(id: string, userId: string): Promise<string> {
	const links = await db().select().from(escalationLinks).where(eq(escalationLinks.escalationId, id));
	return linkToken(links.findLast((link) => link.userId === userId)?.id ?? '');
}
