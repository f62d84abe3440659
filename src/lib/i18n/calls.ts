import type { EscalationState } from '../domain/core/codes';
import { m } from './paraglide/messages';

interface Call {
	state: EscalationState;
	/** The holder's name; left out where the reader is not told. */
	takenBy?: string | null;
	/** Somebody has it and did not come, so that others are sought. */
	notThere?: boolean;
}

/** How a call for help stands, in the same words on every screen: ward, patient, decision, strip. */
export function callWords({ state, takenBy = null, notThere = false }: Call): string {
	switch (state) {
		case 'raised':
			return m.escalations_nobody_has_it();
		case 'taken':
			return notThere
				? m.escalations_nobody_is_there()
				: takenBy === null
					? m.escalations_somebody_else_has_it()
					: m.escalations_somebody_has_it({ name: takenBy });
		case 'settled':
			return m.escalations_is_settled().toLowerCase();
		case 'withdrawn':
			return m.escalations_is_withdrawn().toLowerCase();
	}
}
