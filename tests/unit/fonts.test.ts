import { readdirSync, readFileSync } from 'node:fs';
import fontverter from 'fontverter';
import { beforeAll, describe, expect, it } from 'vitest';
import { lettersOf } from '../../src/cli/lib/font-cmap.mjs';
import { cutFace, FACES, FAMILY } from '../../src/cli/lib/font-faces.mjs';
import { namesOf, tablesOf, type Tables } from '../../src/cli/lib/font-file.mjs';

/** What one face may weigh; every first visit loads all three. */
const FACE_KIB = 32;

/** Names as people write them, with every letter that their language adds to the plain ones. Invented. */
const NAMES: Record<string, string> = {
	Albanian: 'Çelë Ëndra',
	Azeri: 'Əlİşə Ğöçü',
	Catalan: 'Àngel·la Çòïü',
	Croatian: 'Đurđica Čćšž',
	Czech: 'Ďáblík Ťěůřňžéý',
	Danish: 'Åse Ærøskøb Ǿǽ',
	Dutch: 'Ĳsbrand ĳ Noëlle',
	Estonian: 'Õnne Žäöüš',
	Faroese: 'Óðin Ýví Øá',
	Finnish: 'Åke Öhmän Š',
	French: 'Cœur Élodie Ÿæçèêëîïôùûü',
	German: 'Weiß Übelöhr Ähre STRAẞE',
	Hungarian: 'Őry Űző Áéíóöúü',
	Icelandic: 'Þórður Ægir Ýrr',
	Irish: 'Ó Séaghdha Úna Ḃḋḟġṁṗṡṫ',
	Italian: 'Nicolò Papà Ìù',
	Latvian: 'Ģirts Ķīsis Ļūņa Ēčšžā',
	Lithuanian: 'Žydrūnas Ųėįęąčš',
	Livonian: 'Ȭȱȯȳ Ȯȩ',
	Maltese: 'Ġorġ Ħaż Ċ',
	Norwegian: 'Ådne Bjørn Sæther',
	Polish: 'Łucja Żółć Ńąęś Źć',
	Portuguese: 'João Conceição Ênõü',
	Romanian: 'Ștefan Țăruș Înâ',
	Sami: 'Ŋuorra Đáŧ Ǩǥǧǯʒ',
	Scots: 'Mòrag MacRùith',
	Slovak: 'Ľubomír Ĺŕôäť',
	Slovene: 'Žiga Čuš Ȁȉ',
	Spanish: 'Ñusta Güell Íáéóú',
	Swedish: 'Åsa Östlänk É',
	Turkish: 'Şığ İlkgüç Öü',
	Welsh: 'Ŵŷn Siôn Ẁẃẅ Ỳŷ',
	punctuation: 'O’Dálaigh, d‘Aubry, Ann-Marie “Mia” – §½ ‚‘ „“ «» ‹›'
};

const tables = new Map<number, Tables>();

beforeAll(async () => {
	for (const { weight } of FACES) {
		const file = readFileSync(`src/lib/fonts/${weight}.woff2`);
		tables.set(weight, tablesOf(await fontverter.convert(file, 'sfnt')));
	}
});

/** The letters of a text that a face has no glyph for. */
function missing(weight: number, text: string): string[] {
	const has = lettersOf(tables.get(weight) ?? {});
	return [...text].filter((letter) => !has.has(letter.codePointAt(0) ?? 0));
}

describe.each(FACES)('the face of weight $weight', ({ weight, source, style }) => {
	it.each(Object.entries(NAMES))('writes a name in %s: %s', (_, name) => {
		expect(missing(weight, name)).toEqual([]);
		// As some systems send it: accents apart from their letters.
		expect(missing(weight, name.normalize('NFD'))).toEqual([]);
	});

	it('has not the letters that are left out', () => {
		expect(missing(weight, 'Ắộ Жф Ωλ')).toEqual([...'ẮộЖфΩλ']);
	});

	it('writes every word of ours', () => {
		const folder = 'src/lib/i18n/messages';
		const words = readdirSync(folder, { recursive: true, encoding: 'utf8' })
			.filter((name) => name.endsWith('.json'))
			.map((name) => Object.values(JSON.parse(readFileSync(`${folder}/${name}`, 'utf8')) as object).join(''));
		expect(words.join('').length).toBeGreaterThan(10_000);
		expect(missing(weight, words.join('').replaceAll('\n', ''))).toEqual([]);
	});

	it(`weighs at most ${FACE_KIB} KiB`, () => {
		const bytes = readFileSync(`src/lib/fonts/${weight}.woff2`).length;
		expect(bytes).toBeGreaterThan(1024);
		expect(bytes).toBeLessThanOrEqual(FACE_KIB * 1024);
	});

	it('keeps to the licence: bears our name alone, and says whose drawing it is', () => {
		// The numbers of the OpenType specification: family, unique, full and PostScript name.
		const names = namesOf(tables.get(weight) ?? {});
		for (const id of [1, 3, 4, 6]) {
			expect(names[id]).toContain(id === 6 ? FAMILY.replace(' ', '') : FAMILY);
			expect(names[id]).not.toMatch(/lato/i);
		}
		expect(names[0]).toContain('Reserved Font Name "Lato"');
		expect(names[13]).toContain('SIL Open Font License, Version 1.1');
	});

	it('is what is cut from its source today', async () => {
		const cut = await cutFace({ weight, source, style });
		expect(cut.equals(readFileSync(`src/lib/fonts/${weight}.woff2`))).toBe(true);
	});
});
