import { can } from '$lib/domain/access/can';
import type { LooseEnds } from '$lib/domain/loose-ends/loose-ends';
import { unitsOf } from './auth/people';
import type { PersonContext } from './context';
import { coverNow } from './cover/queries';
import { db } from './db';
import { env } from './env';
import { looseEndsOf } from './loose-ends/queries';
import { read } from './read';

const NOTHING_OPEN: LooseEnds = { mine: [], theirs: [] };

/** What the frame around every signed-in page shows: who, which units, who is on cover, what is open, which way out does not
 * work, the time. */
export async function frameOf(context: PersonContext, cursor: number) {
	const { actor, now } = context;
	const [units, cover, looseEnds, delivery, alarms] = await Promise.all([
		unitsOf(db(), actor.id),
		coverNow(db(), actor.unitIds, now),
		can(actor, 'episode.read') ? looseEndsOf(db(), actor, now) : NOTHING_OPEN,
		read.delivery(context),
		read.alarms(context)
	]);
	return {
		user: { id: actor.id, name: actor.name, role: actor.role, senior: actor.senior ?? false },
		units,
		cover,
		looseEnds,
		delivery,
		alarms: { items: alarms },
		seesPatients: can(actor, 'episode.read'),
		readsEscalations: can(actor, 'escalation.read'),
		cursor,
		now,
		zone: env().hospital.zone,
		hospital: env().hospital.name,
		demo: env().demo
	};
}
