import type { Instant } from '../core/time';
import { LINE_KINDS, type LineKind } from './codes';

/** These kinds in the order of the list, each once. */
export function inListOrder(kinds: readonly LineKind[]): LineKind[] {
	return LINE_KINDS.filter((kind) => kinds.includes(kind));
}

/**
 * The oxygen that stands: what was said of the latest instant, whoever wrote it down later.
 * @param said notes and sessions' readings; of the same instant the first of them counts
 * @returns null where nobody has said anything, which is not the same as no oxygen
 */
export function standingOxygen<T extends { at: Instant }>(said: readonly T[]): T | null {
	return said.reduce<T | null>((newest, one) => (newest === null || one.at > newest.at ? one : newest), null);
}
