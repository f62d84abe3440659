import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isGsm7, septetsOf, toGsm7 } from './gsm7';
import { isOneSegment, measureSms } from './sms-length';

const a = (count: number) => 'a'.repeat(count);
const zhe = (count: number) => 'ж'.repeat(count);

describe('measureSms', () => {
	// The limits 160/153 and 70/67 follow from 140 octets, less a header of 6: 3GPP TS 23.038, 23.040.
	it.each([
		['nothing', '', 'gsm7', 0, 0],
		['a', 'a', 'gsm7', 1, 1],
		['160 a', a(160), 'gsm7', 160, 1],
		['161 a', a(161), 'gsm7', 161, 2],
		['306 a', a(306), 'gsm7', 306, 2],
		['307 a', a(307), 'gsm7', 307, 3],
		['459 a', a(459), 'gsm7', 459, 3],
		['460 a', a(460), 'gsm7', 460, 4],
		['158 a and a euro', `${a(158)}€`, 'gsm7', 160, 1],
		['159 a and a euro', `${a(159)}€`, 'gsm7', 161, 2],
		['80 brackets', '['.repeat(80), 'gsm7', 160, 1],
		['81 brackets', '['.repeat(81), 'gsm7', 162, 2],
		['a euro on the seam', `${a(152)}€${a(152)}`, 'gsm7', 306, 3],
		['a euro before the seam', `${a(151)}€${a(153)}`, 'gsm7', 306, 2],
		['70 Cyrillic', zhe(70), 'ucs2', 70, 1],
		['71 Cyrillic', zhe(71), 'ucs2', 71, 2],
		['134 Cyrillic', zhe(134), 'ucs2', 134, 2],
		['135 Cyrillic', zhe(135), 'ucs2', 135, 3],
		['201 Cyrillic', zhe(201), 'ucs2', 201, 3],
		['202 Cyrillic', zhe(202), 'ucs2', 202, 4],
		['68 Cyrillic and an emoji', `${zhe(68)}🙂`, 'ucs2', 70, 1],
		['69 Cyrillic and an emoji', `${zhe(69)}🙂`, 'ucs2', 71, 2],
		['an emoji on the seam', `${zhe(66)}🙂${zhe(66)}`, 'ucs2', 134, 3],
		['an emoji before the seam', `${zhe(65)}🙂${zhe(67)}`, 'ucs2', 134, 2],
		['70 a and a curly apostrophe', `${a(70)}’`, 'ucs2', 71, 2],
		['a whole alphabet of accents', 'éñäöüàèìòùÇØøÅåÆæßÉ', 'gsm7', 19, 1],
		['an escaped one in UCS-2 counts once', 'ж€', 'ucs2', 2, 1],
		['half a surrogate pair', 'a\ud83d', 'ucs2', 2, 1],
		['line breaks', 'a\r\nb', 'gsm7', 4, 1]
	] as const)('%s', (_, text, encoding, units, segments) => {
		expect(measureSms(text)).toEqual({ encoding, units, segments });
		expect(isOneSegment(text)).toBe(segments === 1);
	});

	it.each(['á', 'í', 'ó', 'ú', '’', '“', '–', '—', '`', 'ç', '\t', '\u001b', 'Ж'])(
		'%j is not in the alphabet',
		(character) => {
			expect(measureSms(character).encoding).toBe('ucs2');
		}
	);

	it('one dash halves the room of a reminder', () => {
		const plain = a(120);
		expect(measureSms(plain).segments).toBe(1);
		expect(measureSms(`${plain}–`)).toEqual({ encoding: 'ucs2', units: 121, segments: 2 });
	});

	it('property: parts hold what they say, and adding text never takes a part away', () => {
		const piece = fc.constantFrom('a', '€', '[', 'ж', '🙂', 'é', '\n');
		fc.assert(
			fc.property(fc.array(piece, { maxLength: 400 }), piece, (pieces, more) => {
				const text = pieces.join('');
				const { encoding, units, segments } = measureSms(text);
				const part = encoding === 'gsm7' ? 153 : 67;
				expect(segments).toBeGreaterThanOrEqual(
					units > (encoding === 'gsm7' ? 160 : 70) ? 2 : Math.sign(units)
				);
				expect(segments).toBeGreaterThanOrEqual(segments > 1 ? Math.ceil(units / part) : 0);
				// At most one unit of each part but the last is left over.
				expect(units).toBeGreaterThanOrEqual(segments > 1 ? (segments - 1) * (part - 1) : 0);
				expect(measureSms(text + more).segments).toBeGreaterThanOrEqual(segments);
			})
		);
	});
});

describe('the alphabet', () => {
	it('has 127 characters of one septet and 10 of two, as in 3GPP TS 23.038', () => {
		const all = Array.from({ length: 0x2fff }, (_, code) => String.fromCodePoint(code));
		expect(all.filter((character) => septetsOf(character) === 1)).toHaveLength(127);
		expect(all.filter((character) => septetsOf(character) === 2).sort()).toEqual([...'\f^{}\\[~]|€'].sort());
	});
});

describe('toGsm7', () => {
	it.each([
		['Dún Áras', 'Dun Aras'],
		['St Brigid’s – East', "St Brigid's - East"],
		['“here”…', '"here"...'],
		['Málaga, Łódź, façade', 'Malaga, Lodz, facade'],
		['café au lait à Zürich', 'café au lait à Zürich'],
		['cafe\u0301', 'café'],
		['a\u00a0b', 'a b'],
		['½ ﬁne', '½ fine'],
		['Зал 2', 'Зал 2'],
		['', '']
	])('%j becomes %j', (text, expected) => {
		expect(toGsm7(text)).toBe(expected);
	});

	it('property: changes nothing that the alphabet has', () => {
		const character = fc.constantFrom(...'aZ09@£$èÇ€[]{}~^|\\ ΔΩß\n');
		fc.assert(
			fc.property(fc.array(character), (characters) => {
				const text = characters.join('');
				expect(toGsm7(text)).toBe(text);
				expect(isGsm7(toGsm7(text))).toBe(true);
			})
		);
	});
});
