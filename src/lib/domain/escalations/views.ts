import type { EscalationState, Grade, Post, Role } from '../core/codes';

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
	holder: { id: string; name: string } | null;
	takenAt: string | null;
	etaMinutes: number | null;
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
		channel: 'sms' | null;
		at: string;
		message: string | null;
	}[];
	/** Who is told next and when; null once somebody has it. */
	next: { step: number; posts: readonly Post[]; at: string } | null;
	/** Everybody was told and nobody took it. */
	chainSpent: boolean;
	moves: { at: string; by: string | null; kind: string }[];
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
