import { readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { at } from './paths.mjs';

/**
 * @typedef {{ file: string, imports?: string[] }} Chunk
 * @typedef {Record<string, Chunk>} Manifest of the built client, by the source of each chunk
 * @typedef {Record<string, number[]>} Pages the numbers of the nodes that each page is made of, the root included
 * @typedef {{ page: string, kib: number, most: number }} Weight
 */

/**
 * Script that a first page may load, KiB after gzip, and how much more any other may load in all: who comes straight
 * to a patient from a message loads that page whole, and not what it has beyond another.
 */
export const FIRST_KIB = 120;
export const MORE_KIB = 40;

const GENERATED = '.svelte-kit/generated/client-optimized';
const CLIENT = '.svelte-kit/output/client';
/** Pages inside that somebody comes to first: after the sign-in. */
const FIRST = '/(app)/loose-ends';

/**
 * What each page loads before it can be used; what is fetched later, once somebody comes to it, is not counted. The
 * patient's own page is weighed too, although it sends none of the script that the build has for it.
 * @param {Manifest} manifest
 * @param {Pages} pages
 * @param {(file: string) => number} kibOf
 * @returns {Weight[]}
 */
export function weightsOf(manifest, pages, kibOf) {
	const start = Object.keys(manifest).find((source) => source.endsWith('/client/entry.js')) ?? 'the start';
	return Object.entries(pages).map(([page, nodes]) => {
		const files = new Set();
		const sources = [start, `${GENERATED}/app.js`, ...nodes.map((node) => `${GENERATED}/nodes/${node}.js`)];
		for (const source of sources) {
			add(manifest, source, files);
		}
		const kib = [...files].reduce((sum, file) => sum + kibOf(file), 0);
		const inside = page.startsWith('/(app)/') && page !== FIRST;
		return { page, kib, most: inside ? FIRST_KIB + MORE_KIB : FIRST_KIB };
	});
}

/**
 * @param {Manifest} manifest
 * @param {string} source
 * @param {Set<string>} files gets the chunk of that source and all that it imports
 */
function add(manifest, source, files) {
	const chunk = manifest[source];
	if (!chunk) {
		throw new Error(`The build has no chunk of ${source}.`);
	}
	if (!files.has(chunk.file)) {
		files.add(chunk.file);
		chunk.imports?.forEach((each) => add(manifest, each, files));
	}
}

/**
 * The pages of the generated client: `"/(app)/ward": [~34,[2]]` is node 34 within the layouts 0 and 2.
 * @param {string} source
 * @returns {Pages}
 */
export function pagesOf(source) {
	const dictionary = /dictionary = \{([\s\S]*?)\};/.exec(source)?.[1] ?? '';
	return Object.fromEntries(
		[...dictionary.matchAll(/"([^"]+)": \[~?(\d+)(?:,\[([\d,]*)\])?/g)].map(
			([, page, node, layouts = '']) => [
				page,
				// The first is around every page, the second is the page of errors, which the start fetches as well.
				[0, 1, ...layouts.split(',').filter(Boolean).map(Number), Number(node)]
			]
		)
	);
}

/** Weighs the build that was made last. The page of parts belongs to those who build pages, and is not held to it. */
export function weighBuild() {
	const manifest = JSON.parse(readFileSync(at(CLIENT, '.vite', 'manifest.json'), 'utf8'));
	const pages = pagesOf(readFileSync(at(GENERATED, 'app.js'), 'utf8'));
	const kibOf = (/** @type {string} */ file) =>
		gzipSync(readFileSync(path.join(at(CLIENT), file))).length / 1024;
	return weightsOf(manifest, pages, kibOf).filter(({ page }) => !page.startsWith('/style'));
}
