import type { MessageChannel } from '../messages/codes';
import type { EscalationMoveKind, EscalationState, Grade, Post, Role } from '../core/codes';

export interface EscalationView {
	id: string;
	episodeId: string;
	/** The unit where the patient lies now. */
	unit: string;
	unitId: string;
	bed: string | null;
	patientName: string;
	/** The second identifiers. */
	birthDate: string;
	mrn: string;
	grade: Grade;
	state: EscalationState;
	situation: string;
	background: string;
	assessment: string;
	request: string;
	neededBy: string | null;
	sessionId: string | null;
	threadId: string | null;
	raisedBy: { id: string; name: string; role: Role };
	raisedAt: string;
	/** Whom the raiser named as told in person. */
	toldInPerson: { id: string; name: string } | null;
	/** The newest calls that were added while it was open, oldest first; at most {@link ADDED_SHOWN}. */
	added: AddedCall[];
	/** How many were added in all. */
	addedTotal: number;
	/** Everybody but its raiser who added a call of their own: what they called for is not the raiser's to withdraw. */
	otherCallers: readonly { id: string; name: string }[];
	holder: { id: string; name: string } | null;
	takenAt: string | null;
	etaMinutes: number | null;
	/** When the holder said to be there. */
	etaAt: string | null;
	/** When the holder was asked whether they are there; null once they have answered. */
	askedAt: string | null;
	arrivedAt: string | null;
	passTo: { id: string; name: string } | null;
	passReason: string | null;
	endedBy: { id: string; name: string } | null;
	endedAt: string | null;
	outcome: string | null;
	note: string | null;
	informed: string | null;
	recheckDueAt: string | null;
	/** From when the steps of the chain count: the raising, or the moment a worse grade started it again. */
	chainStartedAt: string;
	/** Who was told, by which channel and when; `name` is null where nobody was on cover for the post. */
	steps: {
		step: number;
		post: Post;
		name: string | null;
		channel: MessageChannel | null;
		at: string;
		message: string | null;
	}[];
	/** Who is told next and when; null while somebody has it and comes. */
	next: { step: number; posts: readonly Post[]; at: string } | null;
	/** Everybody was told and nobody took it. */
	chainSpent: boolean;
	/** `other` is whom a move names beside its maker: the receiver or the giver of a pass, whoever was asked. */
	moves: {
		at: string;
		by: string | null;
		kind: EscalationMoveKind;
		other: string | null;
		etaMinutes: number | null;
	}[];
}

/** More are never shown at once; the rest is on record, and in the threads. */
export const ADDED_SHOWN = 20;

/** What a further caller said about an escalation that was open already. */
export interface AddedCall {
	id: string;
	by: { id: string; name: string; role: Role };
	at: string;
	grade: Grade;
	/** It made the escalation graver. */
	raisedGrade: boolean;
	situation: string;
	background: string;
	assessment: string;
	request: string;
	neededBy: string | null;
	toldInPerson: { id: string; name: string } | null;
	sessionId: string | null;
	threadId: string | null;
}

/** An escalation that nobody comes for as every screen of its unit shows it: where and since when, never what about. */
export interface Alarm {
	id: string;
	unitId: string;
	unit: string;
	bed: string | null;
	grade: Grade;
	raisedAt: string;
	/** Somebody took it and did not come. */
	taken: boolean;
	/** Everybody was told. */
	chainSpent: boolean;
}

/** Somebody an escalation can be passed on to. */
export interface Receiver {
	id: string;
	name: string;
	role: Role;
	/** The post they cover on the unit now, or null. */
	post: Post | null;
}

/** What an SMS link shows to whoever holds it: unit, bed, grade, state. Never a patient's name, never a reading. */
export interface PhoneEscalation {
	id: string;
	unit: string;
	bed: string | null;
	grade: Grade;
	state: EscalationState;
	raisedAt: string;
	raisedByRole: Role;
	/** The holder's name, so that a second reader knows that somebody goes. */
	holder: string | null;
	takenAt: string | null;
	/** True when the holder is the person of this link. */
	mine: boolean;
	/** When the holder said to be there. */
	etaAt: string | null;
	arrivedAt: string | null;
	/** True when the person of this link was asked whether they are there. */
	asked: boolean;
	/** Until when the person of this link can take their taking back; null when they do not hold it. */
	undoUntil: string | null;
	/** True when the holder waits for the person of this link to confirm that they have it. */
	passedToMe: boolean;
	usable: boolean;
	chainStartedAt: string;
	steps: ChainPost[];
	/** When the next step of the chain is due; null once somebody has it. */
	nextAt: string | null;
}

/** One step of the chain: after how long from its start, who, and whether they have been told. */
export interface ChainPost {
	afterSeconds: number;
	posts: readonly Post[];
	told: boolean;
}
