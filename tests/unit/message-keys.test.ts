import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const FOLDER = 'src/lib/i18n/messages/en';
const FILES = readdirSync(FOLDER).filter((file) => file.endsWith('.json'));

/** The keys of one file in their order, a repeated one each time: parsed JSON would show it once. */
function keysOf(file: string): string[] {
	const text = readFileSync(path.join(FOLDER, file), 'utf8');
	return [...text.matchAll(/^\t"((?:[^"\\]|\\.)+)":/gm)].map(([, key = '']) => key);
}

describe('the words of the screens', () => {
	it.each(FILES)('%s has each key once', (file) => {
		const keys = keysOf(file).filter((key) => !key.startsWith('$'));
		const parsed = JSON.parse(readFileSync(path.join(FOLDER, file), 'utf8')) as object;
		expect(keys.length).toBeGreaterThan(0);
		expect(keys.toSorted()).toEqual(
			Object.keys(parsed)
				.filter((key) => !key.startsWith('$'))
				.toSorted()
		);
	});

	it('have no key in two files: the one read last would win without a word', () => {
		const homes = new Map<string, string[]>();
		for (const file of FILES) {
			for (const key of keysOf(file).filter((one) => !one.startsWith('$'))) {
				homes.set(key, [...(homes.get(key) ?? []), file]);
			}
		}
		expect([...homes].filter(([, files]) => files.length > 1)).toEqual([]);
	});
});
