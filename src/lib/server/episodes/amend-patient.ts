import { eq } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { PATIENT_FIELDS, type PatientField } from '$lib/domain/episodes/identity';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { patientAmendments, patients } from '../db/schema';
import { newId } from '../ids';
import { replanReminders, rewordReminders } from '../visits/waiting-reminders';

type PatientRow = typeof patients.$inferSelect;

/** Change what a record of a patient says, and keep what stood there before. Nothing changed leaves no trace. */
export async function amendPatient(
	tx: Tx,
	context: PersonContext,
	known: PatientRow,
	after: Partial<Pick<PatientRow, PatientField>>
): Promise<AuditEvent[]> {
	const changed = PATIENT_FIELDS.filter((field) => field in after && after[field] !== known[field]);
	if (changed.length === 0) {
		return [];
	}
	await tx.update(patients).set(after).where(eq(patients.id, known.id));
	await tx.insert(patientAmendments).values(
		changed.map((field) => ({
			id: newId(),
			patientId: known.id,
			at: context.now,
			byId: context.actor.id,
			field,
			before: textOf(known[field]),
			after: textOf(after[field])
		}))
	);
	await fitReminders(tx, { ...known, ...after }, changed, context.now);
	const detail = Object.fromEntries(changed.map((field) => [field, true]));
	return [{ action: 'patient.amended', objectKind: 'patient', objectId: known.id, detail }];
}

function textOf(value: string | boolean | null | undefined): string | null {
	return value === null || value === undefined ? null : String(value);
}

/** What waits to be sent tells the new language, and comes at the daytime of the new zone. */
async function fitReminders(
	tx: Tx,
	patient: PatientRow,
	changed: readonly PatientField[],
	now: number
): Promise<void> {
	if (changed.includes('zone')) {
		await replanReminders(tx, patient, now);
	}
	if (changed.includes('language')) {
		await rewordReminders(tx, patient);
	}
}
