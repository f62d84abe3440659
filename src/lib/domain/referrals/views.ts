import type { Priority, ReferralState, Role, Service, Strand } from '../core/codes';
import type { EntryKind, RefKind } from './entries';

export interface EntryLine {
	id: string;
	seq: number;
	at: string;
	/** Null when the patient or the product itself speaks. */
	author: { id: string; name: string; role: Role } | null;
	strand: Strand;
	kind: EntryKind;
	body: string;
	ref: { kind: RefKind; id: string } | null;
	/** To whom the entry puts a question. */
	asked: AskedPerson[];
}

/** Somebody to whom a question is put; open until they write into the thread or say that they have seen it. */
export interface AskedPerson {
	mentionId: string;
	id: string;
	name: string;
	open: boolean;
}

/** Somebody of the unit, to choose from. */
export interface Colleague {
	id: string;
	name: string;
	role: Role;
}

export interface ThreadView {
	referral: {
		id: string;
		episodeId: string;
		service: Service;
		priority: Priority;
		question: string;
		state: ReferralState;
		reason: string | null;
		askedBy: { id: string; name: string };
		askedAt: string;
		decidedBy: { id: string; name: string } | null;
		decidedAt: string | null;
	};
	items: EntryLine[];
	next: string | null;
}
