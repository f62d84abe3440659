import { and, eq, inArray } from 'drizzle-orm';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { isExpected } from '$lib/domain/visits/states';
import type { Reader } from '../db';
import { escalationLinks, escalations, invitations, pushDevices, users, visits } from '../db/schema';
import type { OutboxRow } from './change';
import { recheckAnswer, recheckNews, recheckPageLink, recheckReminder } from './recheck-patient';
import { NOT_WAITING, skip, type Verdict } from './verdict';

/**
 * Is the message still wanted, still allowed, and whom does it reach? Read from the tables at the moment of
 * sending: between the cause and now somebody may have taken the call, left, cancelled, or asked for no texts.
 */
export async function recheck(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	switch (row.kind) {
		case 'escalation':
			return recheckEscalation(reader, row, now);
		case 'notice':
			return recheckNotice(reader, row, now);
		case 'reminder':
			return recheckReminder(reader, row, now);
		case 'answer':
			return now >= row.expiresAt ? skip('too late') : recheckAnswerTo(reader, row);
		case 'visit':
			return recheckNews(reader, row, now);
		case 'page':
			return recheckPageLink(reader, row, now);
		case 'mail':
			return recheckMail(reader, row, now);
		case 'trial':
			return now >= row.expiresAt ? skip('too late') : toStaff(reader, row);
	}
}

async function recheckEscalation(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const [escalation] = await reader.select().from(escalations).where(eq(escalations.id, row.refId));
	if (!escalation || !isWaitingFor(escalation, row.userId)) {
		return skip(NOT_WAITING);
	}
	const verdict = await toStaff(reader, row);
	if (verdict.kind === 'send' && !(await linkStillGood(reader, row, now))) {
		return skip('link used, expired or not theirs');
	}
	return verdict.kind === 'send' && now >= row.expiresAt ? { kind: 'fail', reason: 'expired' } : verdict;
}

/** Untaken, sought beside a holder who does not come, passed on to them, or they are the holder who is asked. */
function isWaitingFor(escalation: typeof escalations.$inferSelect, userId: string | null): boolean {
	const { state, passTo, takenBy, holderAskedAt } = escalation;
	const asked = takenBy === userId && holderAskedAt !== null;
	return (
		state === 'raised' || isSoughtAnew(escalation) || (state === 'taken' && (passTo === userId || asked))
	);
}

/** That somebody has it, as long as somebody else than the reader has. */
async function recheckNotice(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const [escalation] = await reader.select().from(escalations).where(eq(escalations.id, row.refId));
	if (!escalation || escalation.state === 'raised' || escalation.takenBy === row.userId) {
		return skip('nobody else has the escalation');
	}
	return now >= row.expiresAt ? skip('too late') : toStaff(reader, row);
}

/** A link opens the call for one person: it must never travel to somebody else's telephone. */
async function linkStillGood(reader: Reader, row: OutboxRow, now: number): Promise<boolean> {
	if (row.linkId === null) {
		return !row.body.includes('{link}');
	}
	const [link] = await reader.select().from(escalationLinks).where(eq(escalationLinks.id, row.linkId));
	return link !== undefined && link.userId === row.userId && link.usedAt === null && link.expiresAt > now;
}

/** An answer to staff, to a patient, or to a number that is nobody's alone. */
async function recheckAnswerTo(reader: Reader, row: OutboxRow): Promise<Verdict> {
	if (row.userId !== null) {
		return toStaff(reader, row);
	}
	const verdict = await recheckAnswer(reader, row);
	if (verdict !== null) {
		return verdict;
	}
	return row.address === null
		? skip('nobody to send to')
		: { kind: 'send', receiver: { to: row.address, name: null } };
}

async function recheckMail(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	if (row.refKind === 'visit') {
		const [visit] = await reader.select().from(visits).where(eq(visits.id, row.refId));
		if (!visit || !(await isAnyExpected(reader, visit))) {
			return skip('visit is over or cancelled');
		}
	}
	if (row.refKind === 'account' && (await invitationUsed(reader, row))) {
		return skip('invitation used');
	}
	const verdict = await toStaff(reader, row);
	return verdict.kind === 'send' && now >= row.expiresAt ? { kind: 'fail', reason: 'expired' } : verdict;
}

/** A mail about a series hangs on its first visit, and is about all of them. */
async function isAnyExpected(
	reader: Reader,
	{ state, seriesId }: typeof visits.$inferSelect
): Promise<boolean> {
	if (isExpected(state) || seriesId === null) {
		return isExpected(state);
	}
	const expected = inArray(visits.state, ['planned', 'confirmed']);
	return (await reader.$count(visits, and(eq(visits.seriesId, seriesId), expected))) > 0;
}

/** Used, or ended by a newer one or because the account was disabled: a link that opens nothing is only a riddle. */
async function invitationUsed(reader: Reader, { linkId }: OutboxRow): Promise<boolean> {
	const [invitation] =
		linkId === null ? [] : await reader.select().from(invitations).where(eq(invitations.id, linkId));
	return invitation?.usedAt !== null;
}

/** By the channel's own way to them: their telephone, their mailbox, or the device that the notice is for. */
async function toStaff(reader: Reader, { userId, channel, deviceId }: OutboxRow): Promise<Verdict> {
	const [user] = userId === null ? [] : await reader.select().from(users).where(eq(users.id, userId));
	if (!user) {
		return skip('nobody to send to');
	}
	if (user.disabledAt !== null) {
		return skip('account disabled');
	}
	switch (channel) {
		case 'push':
			return toDevice(reader, user.id, deviceId);
		case 'mail':
			return { kind: 'send', receiver: { to: user.email, name: user.name } };
		case 'sms':
		case 'voice':
			return user.phone === null
				? skip('no telephone number')
				: { kind: 'send', receiver: { to: user.phone, name: null } };
	}
}

/** Only as long as the device is theirs: somebody else may sign in on it. */
async function toDevice(reader: Reader, userId: string, deviceId: string | null): Promise<Verdict> {
	const [device] = await reader
		.select()
		.from(pushDevices)
		.where(and(eq(pushDevices.id, deviceId ?? ''), eq(pushDevices.userId, userId)));
	if (!device) {
		return skip('notices are turned off');
	}
	const { endpoint, p256dh, auth } = device;
	return { kind: 'send', receiver: { to: endpoint, name: null, keys: { p256dh, auth } } };
}
