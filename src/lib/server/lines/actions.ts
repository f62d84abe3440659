import { and, eq, isNull } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import type { LineIn, OxygenInput } from '$lib/domain/lines/forms';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { LINE_WORDS, oxygenWords } from '$lib/i18n/lines';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode, accessLine } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { lines, oxygenNotes, users } from '../db/schema';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';

interface Noted {
	id: string;
}

/**
 * Note that a line is in.
 * @throws Problem `wrong-state` where one of the kind is in already: what is put in again was out before
 */
export function noteLineIn(
	context: PersonContext,
	episodeId: string,
	{ kind }: LineIn
): Promise<Written<Noted>> {
	return write(context, 'line.note', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'line.note');
		const [there] = await tx
			.select({ by: users.name })
			.from(lines)
			.innerJoin(users, eq(users.id, lines.inBy))
			.where(and(eq(lines.episodeId, episodeId), eq(lines.kind, kind), isNull(lines.outAt)));
		const line = LINE_WORDS[kind]();
		if (there) {
			throw new Problem('wrong-state', m.lines_problem_in({ line, name: there.by }), { state: 'in' });
		}
		const id = newId();
		await tx
			.insert(lines)
			.values({ id, episodeId, kind, inBy: context.actor.id, inAt: context.now, outBy: null, outAt: null });
		return following(tx, context, {
			audit: { action: 'line.noted-in', objectKind: 'line', objectId: id, episodeId, detail: { kind } },
			what: 'line-in',
			body: m.lines_entry_in({ line })
		});
	});
}

/**
 * Note that a line is out.
 * @throws Problem `wrong-state` where it is out already
 */
export function noteLineOut(context: PersonContext, id: string): Promise<Written<Noted>> {
	return write(context, 'line.note', async (tx) => {
		const { kind, episodeId, outBy } = await accessLine(tx, context.actor, id, 'line.note');
		const line = LINE_WORDS[kind]();
		if (outBy !== null) {
			throw new Problem('wrong-state', m.lines_problem_out({ line, name: outBy }), { state: 'out' });
		}
		await tx.update(lines).set({ outBy: context.actor.id, outAt: context.now }).where(eq(lines.id, id));
		return following(tx, context, {
			audit: { action: 'line.noted-out', objectKind: 'line', objectId: id, episodeId, detail: { kind } },
			what: 'line-out',
			body: m.lines_entry_out({ line })
		});
	});
}

/** Note the flow of oxygen, 0 for none. A session's reading of a later instant stands over it. */
export function noteOxygen(
	context: PersonContext,
	episodeId: string,
	{ lpm }: OxygenInput
): Promise<Written<Noted>> {
	return write(context, 'line.note', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'line.note');
		const id = newId();
		await tx
			.insert(oxygenNotes)
			.values({ id, episodeId, lpm, notedBy: context.actor.id, notedAt: context.now });
		return following(tx, context, {
			audit: {
				action: 'oxygen.noted',
				objectKind: 'oxygen-note',
				objectId: id,
				episodeId,
				detail: { lpm }
			},
			what: 'oxygen-noted',
			body: m.lines_entry_oxygen({ words: oxygenWords({ lpm }) })
		});
	});
}

interface Deed {
	audit: AuditEvent & { objectKind: 'line' | 'oxygen-note'; episodeId: string };
	/** What the live event says happened. */
	what: string;
	/** What the thread says. */
	body: string;
}

/** What follows from each of the three: it is told in the thread of whoever did it, and pages of the patient hear of it. */
async function following(
	tx: Tx,
	context: PersonContext,
	{ audit, what, body }: Deed
): Promise<Change<Noted>> {
	const { objectKind: kind, objectId: id, episodeId } = audit;
	const threadId = await threadForDeed(tx, episodeId, context.actor);
	return {
		result: { id },
		audit,
		entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind, id } }] : [],
		events: [{ topic: 'episode', kind: what, id: episodeId, episodeId }]
	};
}
