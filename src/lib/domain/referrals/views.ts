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
