import { and, eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { worded } from '$lib/domain/bedside/activities/local';
import { doseNotes } from '$lib/domain/bedside/doses';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { isSenior } from '$lib/domain/bedside/sign-off';
import { Problem, notFound } from '$lib/domain/core/errors';
import { accessEpisode } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { signOffs } from '../db/schema';
import { newId } from '../ids';
import { wordingsOf } from '../limits/activities';
import { write, type Change, type Written } from '../write';
import { make } from './actions';
import { adviceOf, levelOf } from './advice';

/**
 * What a junior gave beyond the cautious figure is on record at once, and waits for a senior's signature. Nothing
 * is asked of a senior, or where every dose stayed at the cautious figure.
 */
export async function askForSignature(
	tx: Tx,
	context: PersonContext,
	/** With the unit the patient lay in when it was given: its doses counted. */
	episode: { id: string; unitId: string },
	sessionId: string,
	{ activities }: Pick<SessionBody, 'activities'>
): Promise<void> {
	if (isSenior(context.actor)) {
		return;
	}
	const changes = await wordingsOf(tx, episode.unitId);
	const beyond = activities
		.filter(({ notDone }) => !notDone)
		.flatMap((done) => doseNotes(done, worded(activityByCode(done.code), changes)));
	if (beyond.length > 0) {
		await tx.insert(signOffs).values({
			...{ id: newId(), episodeId: episode.id, kind: 'dose', state: 'asked', sessionId },
			...{ words: beyond.map(({ words }) => words).join(' ') },
			...{ askedBy: context.actor.id, askedAt: context.now }
		});
	}
}

type Signed = Written<{ id: string; state: 'signed' | 'refused' }>;

/** Sign for a junior: a dose that was given, or a level that now holds. */
export function sign(context: PersonContext, id: string): Promise<Signed> {
	return write(context, 'sign-off.decide', async (tx) => {
		const { signOff, episode } = await accessSignOff(tx, context.actor, id);
		await settle(tx, context, id, 'signed', null);
		const change = changeOf(id, episode.id, 'signed');
		if (signOff.toLevel === null) {
			return change;
		}
		const advised = await adviceOf(tx, episode.id, levelOf(episode.level));
		const made = await make(tx, context, episode, {
			...{ to: levelOf(signOff.toLevel), reason: signOff.words, advised },
			...{ signedBy: context.actor.id, decidedBy: signOff.askedBy }
		});
		return {
			...change,
			audit: [change.audit, made.audit].flat() as typeof change.audit,
			entries: made.entries ?? [],
			events: [...(change.events ?? []), ...(made.events ?? [])]
		};
	});
}

/** Say no, with a reason: a level stays as it is; a dose stays on record, and the junior reads why. */
export function refuseToSign(context: PersonContext, id: string, reason: string): Promise<Signed> {
	return write(context, 'sign-off.decide', async (tx) => {
		const { episode } = await accessSignOff(tx, context.actor, id);
		await settle(tx, context, id, 'refused', reason);
		return changeOf(id, episode.id, 'refused');
	});
}

async function accessSignOff(tx: Tx, person: Person, id: string) {
	const [signOff] = await tx.select().from(signOffs).where(eq(signOffs.id, id));
	if (!signOff) {
		throw notFound('sign-off');
	}
	const episode = await accessEpisode(tx, person, signOff.episodeId, 'sign-off.decide');
	if (signOff.state !== 'asked') {
		throw new Problem('wrong-state', `It is ${signOff.state} already.`, { state: signOff.state });
	}
	return { signOff, episode };
}

async function settle(
	tx: Tx,
	context: PersonContext,
	id: string,
	state: 'signed' | 'refused',
	reason: string | null
): Promise<void> {
	await tx
		.update(signOffs)
		.set({ state, reason, decidedBy: context.actor.id, decidedAt: context.now })
		.where(and(eq(signOffs.id, id), eq(signOffs.state, 'asked')));
}

function changeOf(
	id: string,
	episodeId: string,
	state: 'signed' | 'refused'
): Change<{ id: string; state: typeof state }> {
	return {
		result: { id, state },
		audit: { action: `sign-off.${state}`, objectKind: 'sign-off', objectId: id, episodeId },
		events: [{ topic: 'episode', kind: `sign-off-${state}`, id: episodeId, episodeId }]
	};
}
