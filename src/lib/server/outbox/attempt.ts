import { db } from '../db';
import { env } from '../env';
import { linkToken } from '../links';
import { routes } from '$lib/routes';
import { attemptsOf, knownProviderIds } from './attempts';
import type { Channel, Outgoing, Sent } from './channels/channel';
import type { OutboxRow } from './change';
import type { Claimed } from './claim';
import { crashWhereAsked } from './crash-point';
import { recordInterrupted } from './interrupted';
import { recheck } from './recheck';
import type { Receiver } from './verdict';
import { recordAttempt, releaseRow } from './record';

/** An attempt that is not over by then counts as unknown; well within the lease. */
const ATTEMPT_LIMIT_MS = 20_000;
const NOT_LOOKED_UP = 'not-looked-up';
const NEVER_ENDED: Sent = { outcome: { kind: 'unknown', reason: 'no-answer' }, code: 'time-limit' };

/** What an attempt needs from its worker. */
export interface Sending {
	owner: string;
	channel: Channel;
	now: () => number;
	random: () => number;
}

/**
 * See one claimed message through: check again whether it is wanted, ask the gateway first where an earlier
 * attempt may have gone through, send, and put on record what came of it. Nothing is awaited inside a transaction.
 * @returns how the attempt ended; null when none was made
 */
export async function attempt({ row, interruptedAt }: Claimed, sending: Sending): Promise<Sent | null> {
	const { owner, now } = sending;
	if (interruptedAt !== null) {
		await recordInterrupted(row, interruptedAt, now());
	}
	const verdict = await recheck(db(), row, now());
	switch (verdict.kind) {
		case 'wait':
			await releaseRow(row, owner, now(), { state: 'ready', reason: null, nextAt: verdict.until });
			return null;
		case 'skip':
			await releaseRow(row, owner, now(), { state: 'skipped', reason: verdict.reason });
			return null;
		case 'fail':
			await releaseRow(row, owner, now(), { state: 'failed', reason: verdict.reason });
			return null;
		case 'send':
			return sendAndRecord(row, verdict.receiver, sending);
	}
}

async function sendAndRecord(row: OutboxRow, receiver: Receiver, sending: Sending): Promise<Sent> {
	const startedAt = sending.now();
	const message = outgoing(row, receiver, startedAt);
	const sent =
		(await lookedUp(row, message, sending.channel)) ??
		(await within(ATTEMPT_LIMIT_MS, sending.channel.send(message), NEVER_ENDED));
	crashWhereAsked(sent);
	await recordAttempt(
		row,
		sending.owner,
		{ startedAt, endedAt: sending.now(), outcome: sent.outcome, code: sent.code },
		sending.random()
	);
	return sent;
}

/** Fill in what is not stored: the secret link, of a call for help, an invitation or a patient's page. */
function outgoing(row: OutboxRow, { to, name, language, keys }: Receiver, now: number): Outgoing {
	const { id, subject, linkId, calendar } = row;
	const link = linkId === null ? null : env().publicUrl + pathOf(row)(linkToken(linkId));
	const body = link === null ? row.body : row.body.replaceAll('{link}', () => link);
	const notice = keys && { keys, link: link ?? pageOf(row), ...fateOf(row, now) };
	return { id, to, name, language, subject, body, calendar, notice };
}

/** The page that a notice without a secret link opens; it asks for a sign-in where there is none. */
function pageOf({ refKind, refId }: OutboxRow): string {
	return env().publicUrl + (refKind === 'escalation' ? routes.escalation(refId) : routes.account());
}

/** How urgent a notice is, for how long it is of use, and what it takes the place of. */
function fateOf({ kind, refId, expiresAt }: OutboxRow, now: number) {
	return {
		urgent: kind === 'escalation',
		ttlSeconds: Math.max(0, Math.floor((expiresAt - now) / 1000)),
		// What it is about, in the 32 letters that a topic may have; it tells the service nothing.
		topic: refId.replaceAll('-', '').slice(0, 32)
	};
}

/** Which page a secret link opens. */
function pathOf({ refKind }: OutboxRow): (token: string) => string {
	switch (refKind) {
		case 'account':
			return routes.invitation;
		case 'page':
			return routes.patientPage;
		default:
			return routes.phoneLink;
	}
}

/**
 * What became of an earlier attempt of unknown outcome, as far as the gateway can tell. Null means: send now,
 * because there was no such attempt, it did not go through, or sending twice is better than not at all.
 */
async function lookedUp(row: OutboxRow, message: Outgoing, channel: Channel): Promise<Sent | null> {
	const attempts = await attemptsOf(row.id);
	if (attempts.at(-1)?.outcome !== 'unknown' || channel.lookUp === null) {
		return null;
	}
	const found = await within(ATTEMPT_LIMIT_MS, channel.lookUp(message), null);
	if (found !== null) {
		const known = await knownProviderIds(found);
		const id = found.find((candidate) => !known.has(candidate));
		return id === undefined ? null : { outcome: { kind: 'accepted', id }, code: 'looked-up' };
	}
	const sent = attempts.filter(({ outcome, code }) => outcome === 'unknown' && code !== NOT_LOOKED_UP);
	return sent.length <= blindRepeats(row)
		? null
		: { outcome: { kind: 'unknown', reason: 'no-answer' }, code: NOT_LOOKED_UP };
}

/**
 * How often a message whose fate is unknown goes out again while the gateway cannot be asked. Silence is the harm in a
 * call for help, a second copy a nuisance. A reminder has days to ask again, and nobody is reminded twice.
 */
function blindRepeats({ kind }: OutboxRow): number {
	switch (kind) {
		case 'escalation':
			return Infinity;
		case 'reminder':
			return 0;
		default:
			return 1;
	}
}

/** What the work answers, or the fallback when it takes too long. */
async function within<T>(limitMs: number, work: Promise<T>, fallback: T): Promise<T> {
	let timer: NodeJS.Timeout | undefined;
	const late = new Promise<T>((resolve) => {
		timer = setTimeout(() => resolve(fallback), limitMs);
	});
	try {
		return await Promise.race([work, late]);
	} finally {
		clearTimeout(timer);
	}
}
