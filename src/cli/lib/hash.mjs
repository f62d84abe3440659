import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';

/**
 * One digest over the names and contents of all files below the given paths, so that a change, a new file and a
 * removed one all show. A path that does not exist counts as empty.
 * @param {string} root the folder that names are relative to
 * @param {string[]} paths files and folders below it
 * @param {(name: string) => boolean} [leaveOut] names, with slashes, that do not count
 */
export function hashOf(root, paths, leaveOut = () => false) {
	const hash = createHash('sha256');
	const names = paths.flatMap((name) => filesBelow(root, name, leaveOut));
	for (const name of names.sort()) {
		hash
			.update(`${name}\0`)
			.update(readFileSync(path.join(root, name)))
			.update('\0');
	}
	return hash.digest('hex');
}

/**
 * @param {string} root
 * @param {string} name
 * @param {(name: string) => boolean} leaveOut
 * @returns {string[]}
 */
function filesBelow(root, name, leaveOut) {
	const full = path.join(root, name);
	if (leaveOut(name) || !existsSync(full)) {
		return [];
	}
	if (!statSync(full).isDirectory()) {
		return [name];
	}
	return readdirSync(full).flatMap((child) => filesBelow(root, `${name}/${child}`, leaveOut));
}
