import { headline } from '../clearances/states';
import type { ClearanceState } from '../core/codes';

/**
 * Whether nothing may be taken by mouth: eating and drinking was asked about and is not cleared, or the airway was
 * held open by a tube since the operation and nobody has cleared it after. Where neither is on record, nobody says.
 * Common practice, no published source.
 * @param clearance how the newest clearance for eating and drinking stands; null where nobody has asked
 * @param tubed whether a session since the operation found a tube or a tracheostomy
 */
export function nothingByMouth(clearance: ClearanceState | null, tubed: boolean): boolean {
	return clearance === null ? tubed : headline(clearance) === 'not-cleared';
}
