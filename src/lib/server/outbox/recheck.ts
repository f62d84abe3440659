import { eq } from 'drizzle-orm';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { isExpected } from '$lib/domain/visits/states';
import { judgeReminder, type SkipReason as ReminderSkip } from '$lib/domain/visits/reminders';
import type { Reader } from '../db';
import { escalationLinks, escalations, invitations, patients, users, visits } from '../db/schema';
import { stopHeardKey } from '../messages/understood';
import type { OutboxRow } from './change';

/** Somebody has the call, or it has ended. Taking back within the moment sends what was skipped for it after all. */
export const NOT_WAITING = 'escalation is not waiting for anybody';

/** Why a message is not sent after all. The words stand in the message log. */
export type SkipReason =
	| ReminderSkip
	| typeof NOT_WAITING
	| 'nobody else has the escalation'
	| 'account disabled'
	| 'link used, expired or not theirs'
	| 'invitation used'
	| 'nobody to send to';

export interface Receiver {
	/** A telephone number or an e-mail address, read at the moment of sending. */
	to: string;
	name: string | null;
}

export type Verdict =
	| { kind: 'send'; receiver: Receiver }
	| { kind: 'wait'; until: number }
	| { kind: 'skip'; reason: SkipReason }
	/** Still wanted, but it came to nothing in time: somebody has to see to it. */
	| { kind: 'fail'; reason: 'expired' };

const skip = (reason: SkipReason): Verdict => ({ kind: 'skip', reason });

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
			return now >= row.expiresAt ? skip('too late') : recheckAnswer(reader, row);
		case 'mail':
			return recheckMail(reader, row, now);
	}
}

async function recheckEscalation(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const [escalation] = await reader.select().from(escalations).where(eq(escalations.id, row.refId));
	if (!escalation || !isWaitingFor(escalation, row.userId)) {
		return skip(NOT_WAITING);
	}
	const verdict = await toStaff(reader, row.userId, 'phone');
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
	return now >= row.expiresAt ? skip('too late') : toStaff(reader, row.userId, 'phone');
}

/** A link opens the call for one person: it must never travel to somebody else's telephone. */
async function linkStillGood(reader: Reader, row: OutboxRow, now: number): Promise<boolean> {
	if (row.linkId === null) {
		return !row.body.includes('{link}');
	}
	const [link] = await reader.select().from(escalationLinks).where(eq(escalationLinks.id, row.linkId));
	return link !== undefined && link.userId === row.userId && link.usedAt === null && link.expiresAt > now;
}

async function recheckReminder(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	const [visit] = await reader.select().from(visits).where(eq(visits.id, row.refId));
	const patient = await patientOf(reader, row);
	if (!visit || !patient) {
		return skip('nobody to send to');
	}
	const verdict = judgeReminder(
		{
			state: visit.state,
			startsAt: visit.startsAt,
			expiresAt: row.expiresAt,
			hasPhone: patient.phone !== null,
			consented: patient.smsConsent,
			optedOut: patient.smsOptedOutAt !== null,
			patientZone: patient.zone
		},
		now
	);
	return verdict.kind === 'send' ? toPatient(patient) : verdict;
}

/**
 * Answers need no consent: they go to somebody who has just written, and tell nothing. After STOP one last text may
 * go, the one that says that it was heard.
 */
async function recheckAnswer(reader: Reader, row: OutboxRow): Promise<Verdict> {
	if (row.userId !== null) {
		return toStaff(reader, row.userId, 'phone');
	}
	const patient = await patientOf(reader, row);
	if (patient) {
		const { smsOptedOutAt } = patient;
		const last = smsOptedOutAt !== null && row.causeKey === stopHeardKey(patient.id, smsOptedOutAt);
		return smsOptedOutAt === null || last ? toPatient(patient) : skip('opted out');
	}
	return row.address === null
		? skip('nobody to send to')
		: { kind: 'send', receiver: { to: row.address, name: null } };
}

async function recheckMail(reader: Reader, row: OutboxRow, now: number): Promise<Verdict> {
	if (row.refKind === 'visit') {
		const [visit] = await reader.select().from(visits).where(eq(visits.id, row.refId));
		if (!visit || !isExpected(visit.state)) {
			return skip('visit is over or cancelled');
		}
	}
	if (row.refKind === 'account' && (await invitationUsed(reader, row))) {
		return skip('invitation used');
	}
	const verdict = await toStaff(reader, row.userId, 'email');
	return verdict.kind === 'send' && now >= row.expiresAt ? { kind: 'fail', reason: 'expired' } : verdict;
}

/** Used, or ended by a newer one or because the account was disabled: a link that opens nothing is only a riddle. */
async function invitationUsed(reader: Reader, { linkId }: OutboxRow): Promise<boolean> {
	const [invitation] =
		linkId === null ? [] : await reader.select().from(invitations).where(eq(invitations.id, linkId));
	return invitation?.usedAt !== null;
}

async function toStaff(reader: Reader, userId: string | null, way: 'phone' | 'email'): Promise<Verdict> {
	const [user] = userId === null ? [] : await reader.select().from(users).where(eq(users.id, userId));
	if (!user) {
		return skip('nobody to send to');
	}
	if (user.disabledAt !== null) {
		return skip('account disabled');
	}
	const to = user[way];
	return to === null
		? skip('no telephone number')
		: { kind: 'send', receiver: { to, name: way === 'email' ? user.name : null } };
}

async function patientOf(reader: Reader, { patientId }: OutboxRow) {
	if (patientId === null) {
		return null;
	}
	const [patient] = await reader.select().from(patients).where(eq(patients.id, patientId));
	return patient ?? null;
}

function toPatient({ phone }: { phone: string | null }): Verdict {
	return phone === null ? skip('no telephone number') : { kind: 'send', receiver: { to: phone, name: null } };
}
