import { realpathSync } from 'node:fs';
import path from 'node:path';

/**
 * The file of a `file:` address itself: however it is written, and whatever points to it, the same file has one name.
 * It need not be there yet.
 */
export function databaseFile(databaseUrl: string): string {
	const given = path.resolve(databaseUrl.replace(/^file:/, ''));
	return real(given) ?? path.join(real(path.dirname(given)) ?? path.dirname(given), path.basename(given));
}

/** Null when it is not there: the first start makes the file. */
function real(place: string): string | null {
	try {
		return realpathSync(place);
	} catch (error) {
		if ((error as NodeJS.ErrnoException).code === 'ENOENT') {
			return null;
		}
		throw error;
	}
}
