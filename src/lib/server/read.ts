import { db } from './db';
import { listSessions } from './bedside/queries';
import { getClearance } from './clearances/queries';
import type { PersonContext } from './context';
import { coverNow } from './cover/queries';
import { getNameboard } from './episodes/nameboard';
import { correctionsOf } from './episodes/operation';
import { listEpisodes } from './episodes/list';
import { alarmsOf } from './escalations/alarms';
import { openCallOf } from './escalations/follow-patient';
import { getEscalation } from './escalations/queries';
import type { PageRequest } from './http/paging';
import { getLevel } from './levels/queries';
import { listActivities } from './limits/activities';
import { patientLimitsOf, unitLimitsOf } from './limits/queries';
import { rangesOf } from './limits/ranges';
import { looseEndsOf } from './loose-ends/queries';
import { troublesFor } from './messages/trouble';
import { listColleagues } from './threads/people';
import { getThread } from './threads/queries';

/**
 * What pages and the JSON API read, with the person and the database filled in. A page's `load` and the API
 * route of the same thing call the same function here, so that a refetch answers what the page was made of.
 */
export const read = {
	looseEnds: ({ actor, now }: PersonContext) => looseEndsOf(db(), actor, now),
	episodes: ({ actor, now }: PersonContext, unit: string | null, request: PageRequest) =>
		listEpisodes(db(), actor, now, unit, request),
	nameboard: ({ actor, now }: PersonContext, episodeId: string) => getNameboard(db(), actor, episodeId, now),
	thread: ({ actor }: PersonContext, id: string, request: PageRequest) => getThread(db(), actor, id, request),
	colleagues: ({ actor }: PersonContext, episodeId: string) => listColleagues(db(), actor, episodeId),
	clearance: ({ actor, now }: PersonContext, id: string) => getClearance(db(), actor, id, now),
	sessions: ({ actor }: PersonContext, episodeId: string) => listSessions(db(), actor, episodeId),
	level: ({ actor }: PersonContext, episodeId: string) => getLevel(db(), actor, episodeId),
	activities: (unitId: string | null) => listActivities(db(), unitId),
	unitLimits: (unitId: string) => unitLimitsOf(db(), unitId),
	patientLimits: ({ actor, now }: PersonContext, episodeId: string) =>
		patientLimitsOf(db(), actor, episodeId, now),
	ranges: ({ actor }: PersonContext, episodeId: string) => rangesOf(db(), actor, episodeId),
	cover: ({ actor, now }: PersonContext) => coverNow(db(), actor.unitIds, now),
	alarms: ({ actor }: PersonContext) => alarmsOf(db(), actor),
	escalation: ({ actor }: PersonContext, id: string) => getEscalation(db(), actor, id),
	corrections: ({ actor }: PersonContext, episodeId: string) => correctionsOf(db(), actor, episodeId),
	openCall: ({ actor }: PersonContext, episodeId: string) => openCallOf(db(), actor, episodeId),
	/** The ways out of the product that do not work now, as a list of the API. */
	delivery: async ({ actor, now }: PersonContext) => ({
		items: await troublesFor(db(), actor, now),
		next: null
	})
};
