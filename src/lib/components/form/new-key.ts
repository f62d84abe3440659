import { v7 } from 'uuid';

/** A key for one write made in the browser: the same key sent twice is the same write. */
export function newKey(): string {
	return v7();
}
