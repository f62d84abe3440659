import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of the project, wherever the command was called from. */
export const ROOT = fileURLToPath(new URL('../../../', import.meta.url));

/**
 * A path below the project's folder.
 * @param {...string} parts
 */
export function at(...parts) {
	return path.join(ROOT, ...parts);
}

/**
 * A program that an installed package brings.
 * @param {string} name
 */
export function bin(name) {
	return at('node_modules', '.bin', name);
}
