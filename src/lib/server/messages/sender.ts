import { and, eq, isNull } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { loadPerson } from '../auth/people';
import type { Reader } from '../db';
import { patients, users } from '../db/schema';

export type PatientRow = typeof patients.$inferSelect;

/** Whose number a text came from. Shared and unknown numbers are parked: nobody is told whose they might be. */
export type Sender =
	| { kind: 'patient'; patient: PatientRow }
	| { kind: 'staff'; person: Person }
	/** One of colleagues, such as a ward's telephone. */
	| { kind: 'shared-staff' }
	/** Of several patients, or of a patient and somebody of staff. */
	| { kind: 'shared'; patients: PatientRow[]; withStaff: boolean }
	| { kind: 'unknown' };

/** @param number in E.164 form, as the gateway gives it */
export async function senderOf(reader: Reader, number: string): Promise<Sender> {
	const found = await reader.select().from(patients).where(eq(patients.phone, number));
	const staff = await reader
		.select({ id: users.id })
		.from(users)
		.where(and(eq(users.phone, number), isNull(users.disabledAt)));
	const [patient] = found;
	const [user] = staff;
	if (found.length + staff.length > 1) {
		return patient
			? { kind: 'shared', patients: found, withStaff: staff.length > 0 }
			: { kind: 'shared-staff' };
	}
	if (patient) {
		return { kind: 'patient', patient };
	}
	const person = user ? await loadPerson(reader, user.id) : null;
	return person ? { kind: 'staff', person } : { kind: 'unknown' };
}
