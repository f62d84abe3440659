import type { Person } from '$lib/domain/access/actor';
import type { Post } from '$lib/domain/core/codes';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { db } from '$lib/server/db';
import { coverShifts, units } from '$lib/server/db/schema';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { newId } from '$lib/server/ids';
import { CALL } from './escalations';
import { addPatient, addPerson, contextOf, HOSPITAL_NOW, newPhone, type Hospital } from './hospital';

const DAY = 24 * 60 * 60 * 1_000;

/** A ward with one nurse on cover. Each test has its own, so that nobody is sent the calls of another. */
export async function openWard(name?: string): Promise<{ ward: string; nurse: Person; phone: string }> {
	const [ward, phone] = [newId(), newPhone()];
	await db()
		.insert(units)
		.values({ id: ward, name: name ?? `Plover ${ward.slice(-6)}`, kind: 'ward', zone: 'Europe/Dublin' });
	const nurse = await addPerson({ role: 'nurse', unitIds: [ward], phone });
	await coverPost(ward, nurse, 'nurse');
	return { ward, nurse, phone };
}

/** The person answers for the post from the day before until the day after. */
export async function coverPost(unitId: string, { id: userId }: Person, post: Post): Promise<void> {
	const [startsAt, endsAt] = [HOSPITAL_NOW - DAY, HOSPITAL_NOW + DAY];
	await db().insert(coverShifts).values({ id: newId(), unitId, post, userId, startsAt, endsAt });
}

/** The therapist calls for help for a patient who has just come to that ward. */
export async function raiseOn(
	{ people }: Hospital,
	unitId: string,
	change: Partial<RaiseInput> = {},
	bed = '4'
): Promise<string> {
	const { episodeId } = await addPatient({ unitId, bed });
	const raiser = { ...people.therapist, unitIds: [unitId] };
	const { result } = await raiseEscalation(contextOf(raiser), episodeId, { ...CALL, ...change });
	return result.id;
}
