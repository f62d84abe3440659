import { sql } from 'drizzle-orm';

/** Where the patient of an open thing is: columns of `place` in the query of open things. */
export const PLACE = sql`place.id as "episodeId", place.unit_id as "unitId", place.unit as "unit", place.bed as "bed", place.patient as "patientName"`;
