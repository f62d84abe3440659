import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { notFound, Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { UntoldVisitView } from '$lib/domain/visits/views';
import { m } from '$lib/i18n/paraglide/messages';
import { accessVisit } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import { db } from '../db';
import { visits } from '../db/schema';
import { patientLine } from '../episodes/list';
import { write, type Written } from '../write';
import { patientOfEpisode } from './remind';
import { isUntold } from './untold';
import { whenOf } from './words';

/**
 * A visit that was cancelled or moved, for whoever calls its patient.
 * @throws Problem `not-found` outside the person's units, and for a visit of which nothing had to be told
 */
export async function getUntoldVisit(person: Person, id: string, now: number): Promise<UntoldVisitView> {
	const { visit } = await accessVisit(db(), person, id, 'visit.plan');
	if (visit.changedAt === null || visit.changedFrom === null) {
		throw notFound('visit');
	}
	const patient = await patientOfEpisode(db(), visit.episodeId);
	const from = whenOf({ startsAt: visit.changedFrom, zone: visit.zone }, now);
	const to = whenOf(visit, now);
	return {
		id,
		body:
			visit.state === 'cancelled'
				? m.home_untold_cancelled({ when: from })
				: m.home_untold_moved({ from, to, place: visit.place }),
		to: { name: patient.name, phone: patient.phone },
		patient: patientLine(patient),
		episodeId: visit.episodeId,
		changedAt: toRfc3339(visit.changedAt),
		settled: !(await isUntold(db(), id))
	};
}

/** The patient was told by a person that their visit is cancelled or at another time. It stands in the thread. */
export function tellInPerson(context: PersonContext, id: string): Promise<Written<{ id: string }>> {
	return write(context, 'visit.plan', async (tx) => {
		const { visit } = await accessVisit(tx, context.actor, id, 'visit.plan');
		if (visit.changedFrom === null || !(await isUntold(tx, id))) {
			throw new Problem('wrong-state', 'Nothing waits to be told to the patient of this visit.', {
				state: visit.state
			});
		}
		await tx.update(visits).set({ toldAt: context.now, toldBy: context.actor.id }).where(eq(visits.id, id));
		const { episodeId, zone } = visit;
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		const when = whenOf({ startsAt: visit.changedFrom, zone }, context.now);
		const body =
			visit.state === 'cancelled'
				? m.visits_entry_told_cancelled({ when })
				: m.visits_entry_told_moved({ when });
		return {
			result: { id },
			audit: { action: 'visit.told', objectKind: 'visit', objectId: id, episodeId },
			entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'visit', id } }] : [],
			events: [{ topic: 'visit', kind: 'told', id, episodeId }]
		};
	});
}
