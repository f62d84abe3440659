import type { KeptBar } from '$lib/domain/bedside/drawn';
import type { Verdict } from '$lib/domain/bedside/finding';
import type { Reading, SessionBody } from '$lib/domain/bedside/forms';
import { parseRfc3339 } from '$lib/domain/core/instant';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { bedsideSessions, findings, readings } from '../db/schema';
import { newId } from '../ids';

/** Which stay the session belongs to, and the operation that it came after. */
export interface SessionOf {
	id: string;
	episodeId: string;
	operationId: string | null;
}

/** Write the rows of one session: itself, its readings, what the rules found. */
export async function insertSession(
	tx: Tx,
	context: PersonContext,
	of: SessionOf,
	input: SessionBody,
	verdict: Verdict,
	bars: KeptBar[]
): Promise<void> {
	await tx.insert(bedsideSessions).values({
		...of,
		startedAt: parseRfc3339(input.startedAt),
		endedAt: parseRfc3339(input.endedAt),
		level: input.level,
		context: { ...input.context },
		symptoms: input.symptoms,
		activities: input.activities,
		outcome: verdict.outcome,
		notJudged: [...verdict.notJudged],
		limitSet: verdict.set,
		limitVersion: verdict.version,
		bars,
		deviation: input.deviation ? { ...input.deviation } : null,
		recordedBy: context.actor.id,
		recordedAt: context.now
	});
	await tx
		.insert(readings)
		.values([
			readingRow(of.id, 'before', 0, input.before),
			...input.during.map((reading, index) => readingRow(of.id, 'during', index, reading)),
			readingRow(of.id, 'after', 0, input.after)
		]);
	if (verdict.findings.length > 0) {
		await tx
			.insert(findings)
			.values(
				verdict.findings.map((finding, ordinal) => ({ ...finding, id: newId(), sessionId: of.id, ordinal }))
			);
	}
}

function readingRow(
	sessionId: string,
	phase: 'before' | 'during' | 'after',
	ordinal: number,
	{ at, ...values }: Reading
): typeof readings.$inferInsert {
	return { id: newId(), sessionId, phase, ordinal, at: at ? parseRfc3339(at) : null, ...values };
}
