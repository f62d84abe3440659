import type { EscalationState, Grade, Post } from '../core/codes';

export interface EscalationView {
	id: string;
	episodeId: string;
	unit: string;
	bed: string | null;
	patientName: string;
	grade: Grade;
	state: EscalationState;
	situation: string;
	background: string;
	assessment: string;
	request: string;
	neededBy: string | null;
	sessionId: string | null;
	threadId: string | null;
	raisedBy: { id: string; name: string; role: string };
	raisedAt: string;
	holder: { id: string; name: string } | null;
	takenAt: string | null;
	etaMinutes: number | null;
	arrivedAt: string | null;
	passTo: { id: string; name: string } | null;
	endedBy: { id: string; name: string } | null;
	endedAt: string | null;
	outcome: string | null;
	note: string | null;
	informed: string | null;
	recheckDueAt: string | null;
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

/** What an SMS link shows to whoever holds it: unit, bed, grade, state. Never a name, never a reading. */
export interface PhoneEscalation {
	id: string;
	unit: string;
	bed: string | null;
	grade: Grade;
	state: EscalationState;
	raisedAt: string;
	raisedByRole: string;
	/** The holder's name, so that a second reader knows that somebody goes. */
	holder: string | null;
	/** True when the holder is the person of this link. */
	mine: boolean;
	usable: boolean;
	steps: { afterSeconds: number; posts: readonly Post[]; told: boolean }[];
}
