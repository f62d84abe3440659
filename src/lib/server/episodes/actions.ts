import { and, eq, isNull } from 'drizzle-orm';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { localDateOf } from '$lib/domain/core/time';
import type { AdmitInput } from '$lib/domain/episodes/forms';
import { normalisePhone } from '$lib/domain/messages/phone';
import { resolveSurgeon, resolveUnit } from '../access/units';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, operations, patients, placements } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Written } from '../write';

/**
 * Admit a patient to a bed: patient (known by hospital number, or new), episode, first placement, operation.
 * @throws Problem `bed-in-use`; `invalid` when the hospital number belongs to somebody else
 */
export function admitPatient(
	context: PersonContext,
	input: AdmitInput
): Promise<Written<{ id: string; patientId: string }>> {
	return write(context, 'episode.admit', async (tx) => {
		const unit = await resolveUnit(tx, context.actor, input.unit, '/unit');
		const surgeonId = input.surgeonId ? await resolveSurgeon(tx, input.surgeonId, '/surgeonId') : null;
		await refuseUsedBed(tx, unit, input.bed);
		const patientId = await findOrMakePatient(tx, context, input.patient);
		const episodeId = newId();
		await tx.insert(episodes).values({
			id: episodeId,
			patientId,
			unitId: unit.id,
			bed: input.bed,
			phase: unit.kind === 'gym' ? 'outpatient' : 'inpatient',
			level: input.level ?? 1,
			betaBlocked: input.betaBlocked ?? null,
			rhythm: input.rhythm ?? null,
			surgeonId,
			createdAt: context.now
		});
		await tx
			.insert(placements)
			.values({ id: newId(), episodeId, unitId: unit.id, bed: input.bed, fromAt: context.now });
		if (input.operation) {
			await tx.insert(operations).values({
				id: newId(),
				episodeId,
				procedure: input.operation.procedure,
				approach: input.operation.approach,
				operatedAt: parseRfc3339(input.operation.operatedAt),
				surgeonId,
				createdAt: context.now
			});
		}
		return {
			result: { id: episodeId, patientId },
			audit: { action: 'episode.admitted', objectKind: 'episode', objectId: episodeId, episodeId },
			events: [{ topic: 'episode', kind: 'admitted', id: episodeId, episodeId }]
		};
	});
}

async function refuseUsedBed(tx: Tx, unit: { id: string; name: string }, bed: string): Promise<void> {
	const [used] = await tx
		.select({ id: episodes.id })
		.from(episodes)
		.where(and(eq(episodes.unitId, unit.id), eq(episodes.bed, bed), isNull(episodes.closedAt)));
	if (used) {
		throw new Problem('bed-in-use', `Bed ${bed} of ${unit.name} is in use.`, { episodeId: used.id });
	}
}

async function findOrMakePatient(
	tx: Tx,
	context: PersonContext,
	input: AdmitInput['patient']
): Promise<string> {
	const [known] = await tx.select().from(patients).where(eq(patients.mrn, input.mrn));
	if (known) {
		// The same number with another birth date is a mistyped number or the wrong patient: never guess.
		if (known.birthDate !== input.birthDate) {
			throw invalidField('/patient/mrn', `The hospital number ${input.mrn} belongs to another patient.`);
		}
		return known.id;
	}
	const { zone } = env().hospital;
	if (input.birthDate > localDateOf(context.now, zone) || input.birthDate < '1900-01-01') {
		throw invalidField('/patient/birthDate', `birthDate ${input.birthDate} is not between 1900 and today.`);
	}
	const id = newId();
	await tx.insert(patients).values({
		id,
		name: input.name,
		mrn: input.mrn,
		birthDate: input.birthDate,
		sex: input.sex,
		phone: input.phone ? phoneOf(input.phone) : null,
		language: input.language ?? 'en',
		zone,
		smsConsent: input.smsConsent ?? false,
		createdAt: context.now
	});
	return id;
}

function phoneOf(text: string): string {
	try {
		return normalisePhone(text);
	} catch (error) {
		throw invalidField('/patient/phone', error instanceof Error ? error.message : 'phone is not a number.');
	}
}
