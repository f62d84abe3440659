import type { CloseReason } from '../core/codes';

const NOBODY_TOLD: readonly CloseReason[] = ['died', 'entered-in-error'];

/** True for an end of which no machine tells anybody: the patient has died, or the stay never was. */
export function isNobodyTold(reason: CloseReason): boolean {
	return NOBODY_TOLD.includes(reason);
}
