import { and, eq, isNull } from 'drizzle-orm';
import type { LinkHolder, Person } from '$lib/domain/access/actor';
import { notFound } from '$lib/domain/core/errors';
import { accessEscalation } from '../access/access';
import { loadPerson } from '../auth/people';
import type { Context } from '../context';
import { db, type Reader, type Tx } from '../db';
import { escalationLinks } from '../db/schema';
import { linkDigest } from '../links';
import { write, type Change, type Written } from '../write';
import type { Moved } from './follow';
import { arrive, giveEta } from './arrive';
import { confirm } from './pass';
import { take, type Taken } from './take';
import type { EscalationRow } from './tell';
import { untake } from './undo';

type Link = typeof escalationLinks.$inferSelect;

/**
 * What the secret link of a text message allows without a sign-in. It is bound to one person and lives for a
 * shift; it takes once, and then says for that person that they are on their way, at the bedside, or that they
 * have what was passed to them. Only by POST: fetching it changes nothing. Readings and settling need a sign-in.
 */
export function takeByLink(context: Context, token: string): Promise<Written<Taken>> {
	return byLink(context, token, async (tx, as, person, row, link) => {
		const [used] = await tx
			.update(escalationLinks)
			.set({ usedAt: as.now })
			.where(and(eq(escalationLinks.id, link.id), isNull(escalationLinks.usedAt)))
			.returning({ id: escalationLinks.id });
		if (!used && row.takenBy !== person.id) {
			throw notFound('link');
		}
		return take(tx, as, person, row, null, 'link');
	});
}

/** Take the taking back, within five seconds. */
export function untakeByLink(context: Context, token: string): Promise<Written<Moved>> {
	return byLink(context, token, (tx, as, person, row) => untake(tx, as, person, row));
}

/** In how many minutes the holder will be there; given, or changed. */
export function giveEtaByLink(context: Context, token: string, minutes: number): Promise<Written<Moved>> {
	return byLink(context, token, (tx, as, person, row) => giveEta(tx, as, person, row, minutes));
}

/** The holder is at the bedside. */
export function arriveByLink(context: Context, token: string): Promise<Written<Moved>> {
	return byLink(context, token, (tx, as, person, row) => arrive(tx, as, person, row));
}

/** The receiver of a pass has it now. */
export function confirmByLink(context: Context, token: string): Promise<Written<Moved>> {
	return byLink(context, token, (tx, as, person, row) => confirm(tx, as, person, row));
}

export async function findLink(reader: Reader, token: string): Promise<Link | null> {
	const [link] = await reader
		.select()
		.from(escalationLinks)
		.where(eq(escalationLinks.tokenHash, linkDigest(token)));
	return link ?? null;
}

/** Whether a token was ever given out, also one that has expired. */
export async function linkExists(token: string): Promise<boolean> {
	return (await findLink(db(), token)) !== null;
}

/**
 * Act as the person whom the link was sent to; the same form sent twice acts once.
 * @throws Problem `not-found` for a link that is unknown or expired, or whose person has no access any more
 */
async function byLink<T>(
	context: Context,
	token: string,
	deed: (tx: Tx, as: Context, person: Person, row: EscalationRow, link: Link) => Promise<Change<T>>
): Promise<Written<T>> {
	const link = await findLink(db(), token);
	const person = link && (await loadPerson(db(), link.userId));
	if (!link || !person || link.expiresAt <= context.now) {
		throw notFound('link');
	}
	const actor: LinkHolder = { kind: 'link', person, escalationId: link.escalationId };
	// The address of a link is its secret: what is kept of a key names the link and not the way to it.
	const key = context.key && { ...context.key, path: `link:${link.id}` };
	const as = { ...context, actor, key };
	return write(as, 'anyone', async (tx) => {
		const { escalation } = await accessEscalation(tx, person, link.escalationId, 'escalation.take');
		return deed(tx, as, person, escalation, link);
	});
}
