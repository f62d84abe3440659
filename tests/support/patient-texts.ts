import { randomBytes } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { VisitState } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { inboundMessages, outbox, visits } from '$lib/server/db/schema';
import { callHook, signedPost } from './hook-server';
import { HOSPITAL_NOW, addPatient, type Hospital } from './hospital';
import { addReminder, addVisit } from './messages';

/** Where the gateway calls in tests of its hooks; `openHospital({ PUBLIC_URL })` must know it. */
export const PUBLIC_URL = 'https://ropewalk.saltmarsh.example';

/** An identifier as the gateway gives one to each text. */
export const newSid = () => `SM${randomBytes(16).toString('hex')}`;

/** The fields of the gateway's call about a text that came in. */
export const text = (From: string, Body: string, MessageSid = newSid()) => ({
	AccountSid: `AC${'0'.repeat(32)}`,
	From,
	To: '+353860000000',
	Body,
	MessageSid
});

/** Somebody writes to us. */
export async function say(from: string, body: string, sid = newSid(), now = HOSPITAL_NOW): Promise<Response> {
	return callHook(signedPost(PUBLIC_URL, '/api/hooks/sms', text(from, body, sid)), now);
}

export async function inbound(sid: string) {
	const [row] = await db().select().from(inboundMessages).where(eq(inboundMessages.providerId, sid));
	return row;
}

/** What was answered to the text. */
export async function answers(sid: string) {
	const row = await inbound(sid);
	return db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.kind, 'answer'), eq(outbox.refId, row?.id ?? '')));
}

/** A patient of their own with one visit that was reminded of. */
export async function remindedPatient(hospital: Hospital, change: Parameters<typeof addVisit>[1] = {}) {
	const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
	const own = { ...hospital, patient, episodeId };
	const visitId = await addVisit(own, change);
	await remind(visitId, patient.id);
	return { own, patient, episodeId, visitId };
}

/** A text about the visit that arrived, a reminder where nothing else is said. */
export async function remind(
	visitId: string,
	patientId: string,
	sentAt = HOSPITAL_NOW,
	change: Parameters<typeof addReminder>[2] = {}
): Promise<string> {
	const id = await addReminder(visitId, patientId, change);
	await db().update(outbox).set({ state: 'delivered', sentAt, attempts: 1 }).where(eq(outbox.id, id));
	return id;
}

export async function stateOf(visitId: string): Promise<VisitState | undefined> {
	const [row] = await db().select().from(visits).where(eq(visits.id, visitId));
	return row?.state;
}
