import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { hashOf } from './hash.mjs';
import { at, ROOT } from './paths.mjs';
import { run } from './run.mjs';

const MARKER = at('node_modules', '.ropewalk-lock');

/** Native packages differ by platform, so a folder carried to another one does not count as installed. */
const PLATFORM = `${process.platform}-${process.arch}`;

/**
 * Installs the locked packages, unless what is installed fits the lock file.
 * @returns {Promise<boolean>} whether the packages are there
 */
export async function ensureInstalled() {
	const wanted = `${PLATFORM} ${hashOf(ROOT, ['package-lock.json'])}`;
	if (readText(MARKER) === wanted) {
		return true;
	}
	if (readText(MARKER) === null && fitsLock(readJson(at('package-lock.json')), installedLock())) {
		writeFileSync(MARKER, wanted);
		return true;
	}
	console.log('Installing packages ...');
	const { code } = await npm(['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=warn']);
	if (code !== 0) {
		console.error(`The packages could not be installed: npm ci ended with code ${code}.`);
		return false;
	}
	writeFileSync(MARKER, wanted);
	return true;
}

/**
 * @typedef {{ version?: string, integrity?: string, optional?: boolean, peer?: boolean }} LockedPackage
 * @typedef {{ packages?: Record<string, LockedPackage> }} Lock
 */

/**
 * Whether packages installed by hand are those of the lock file. npm notes what it installed in a hidden lock of its
 * own; optional packages for other platforms are not in it.
 * @param {Lock | null} lock
 * @param {Lock | null} installed
 */
export function fitsLock(lock, installed) {
	const there = installed?.packages;
	if (!lock?.packages || !there) {
		return false;
	}
	return Object.entries(lock.packages).every(([name, wanted]) => {
		const found = there[name];
		if (name === '') {
			return true;
		}
		return found
			? found.version === wanted.version && found.integrity === wanted.integrity
			: wanted.optional === true;
	});
}

function installedLock() {
	return readJson(at('node_modules', '.package-lock.json'));
}

/**
 * npm itself: the one we run under, when there is one, because another one may stand first in the path.
 * @param {string[]} args
 */
function npm(args) {
	const own = process.env.npm_execpath;
	if (own && path.basename(own) === 'npm-cli.js') {
		return run(process.execPath, [own, ...args]);
	}
	return run('npm', args);
}

/**
 * @param {string} file
 * @returns {string | null}
 */
function readText(file) {
	return existsSync(file) ? readFileSync(file, 'utf8') : null;
}

/**
 * @param {string} file
 * @returns {Lock | null}
 */
function readJson(file) {
	try {
		return JSON.parse(readText(file) ?? 'null');
	} catch {
		return null;
	}
}
