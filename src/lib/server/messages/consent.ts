/** What patients say by text about the texts themselves. */
import { and, desc, eq, inArray, sql } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { toRfc3339 } from '$lib/domain/core/instant';
import { db, type Tx } from '../db';
import { episodes, patientAmendments, patients } from '../db/schema';
import { newId } from '../ids';
import type { PatientRow } from './sender';

/** From now on these patients get no texts. A second STOP does not move the date of the first. */
export async function optOut(tx: Tx, patientIds: string[], now: number): Promise<void> {
	await tx
		.update(patients)
		.set({ smsOptedOutAt: sql`coalesce(${patients.smsOptedOutAt}, ${now})` })
		.where(inArray(patients.id, patientIds));
}

/**
 * Asking for texts is consent in the patient's own words: it takes a STOP back. Where none was on record it amends the
 * record, by nobody of staff.
 */
export async function consent(tx: Tx, patient: PatientRow, now: number): Promise<AuditEvent[]> {
	await tx.update(patients).set({ smsOptedOutAt: null, smsConsent: true }).where(eq(patients.id, patient.id));
	if (patient.smsConsent) {
		return [];
	}
	await tx.insert(patientAmendments).values({
		id: newId(),
		patientId: patient.id,
		at: now,
		byId: null,
		field: 'smsConsent',
		before: 'false',
		after: 'true'
	});
	return [
		{
			action: 'patient.amended',
			objectKind: 'patient',
			objectId: patient.id,
			detail: { smsConsent: true, by: 'patient' }
		}
	];
}

/**
 * When the patient of a stay gave the consent to texts that stands, by a text of their own (RFC 3339); null where
 * staff recorded it, or none stands.
 */
export async function consentByText(episodeId: string): Promise<string | null> {
	const [newest] = await db()
		.select({ at: patientAmendments.at, byId: patientAmendments.byId, after: patientAmendments.after })
		.from(patientAmendments)
		.innerJoin(episodes, eq(episodes.patientId, patientAmendments.patientId))
		.where(and(eq(episodes.id, episodeId), eq(patientAmendments.field, 'smsConsent')))
		.orderBy(desc(patientAmendments.at), desc(patientAmendments.id))
		.limit(1);
	return newest?.byId === null && newest.after === 'true' ? toRfc3339(newest.at) : null;
}
