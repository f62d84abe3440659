import { Refusals } from '$lib/domain/core/refusals';
import { parseRfc3339 } from '$lib/domain/core/instant';
import type { AdmitInput } from '$lib/domain/episodes/forms';
import { resolveSurgeon, resolveUnit } from '../access/units';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, operations } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';
import { identifyPatient, settlePatient } from './patient';
import { phaseIn, placeIn, recordPlacement } from './place';

/**
 * Admit a patient to a bed, or without one to a gym: patient (known by hospital number, or new), episode, first
 * placement, operation.
 * @throws Problem `bed-in-use`; `already-admitted` when the patient has an open stay; `invalid` naming each field
 * that contradicts what is on record under the hospital number
 */
export function admitPatient(
	context: PersonContext,
	input: AdmitInput
): Promise<Written<{ id: string; patientId: string }>> {
	return write(context, 'episode.admit', async (tx) => {
		const { unit, place, surgeonId, who } = await checked(tx, context, input);
		const { patientId, audit } = await settlePatient(tx, context, who);
		const episodeId = newId();
		await tx.insert(episodes).values({
			id: episodeId,
			patientId,
			unitId: unit.id,
			bed: place.bed,
			phase: phaseIn(unit),
			level: input.level ?? 1,
			levelReached: input.level ?? 1,
			betaBlocked: input.betaBlocked ?? null,
			rhythm: input.rhythm ?? null,
			surgeonId,
			createdAt: context.now
		});
		await recordPlacement(tx, episodeId, place, context.now);
		await insertOperation(tx, context.now, episodeId, surgeonId, input.operation);
		return {
			result: { id: episodeId, patientId },
			audit: [
				{ action: 'episode.admitted', objectKind: 'episode', objectId: episodeId, episodeId },
				...audit.map((event) => ({ ...event, episodeId }))
			],
			events: [{ topic: 'episode', kind: 'admitted', id: episodeId, episodeId }]
		};
	});
}

/** Everything that can be wrong with an admission is said at once. */
async function checked(tx: Tx, context: PersonContext, input: AdmitInput) {
	const refusals = new Refusals();
	const unit = await refusals.of(() => resolveUnit(tx, context.actor, input.unit, '/unit'));
	const place = unit && (await refusals.of(() => placeIn(tx, unit, input.bed, null)));
	const { surgeonId } = input;
	const surgeon = surgeonId && (await refusals.of(() => resolveSurgeon(tx, surgeonId, '/surgeonId')));
	const who = await refusals.of(() =>
		identifyPatient(tx, context, input.patient, input.confirmName ?? false)
	);
	refusals.throwIfAny();
	if (!unit || !place || !who) {
		throw new Error('A check refused without a problem.');
	}
	return { unit, place, surgeonId: surgeon || null, who };
}

async function insertOperation(
	tx: Tx,
	now: number,
	episodeId: string,
	surgeonId: string | null,
	operation: AdmitInput['operation']
): Promise<void> {
	if (!operation) {
		return;
	}
	await tx.insert(operations).values({
		id: newId(),
		episodeId,
		procedure: operation.procedure,
		approach: operation.approach,
		operatedAt: parseRfc3339(operation.operatedAt),
		surgeonId,
		createdAt: now
	});
}
