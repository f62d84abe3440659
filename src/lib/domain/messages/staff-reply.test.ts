import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { newReplyCode, readStaffReply } from './staff-reply';

describe('readStaffReply', () => {
	it.each([
		['TAKE 4829', '4829'],
		['take 4829', '4829'],
		['Take 4829', '4829'],
		[' Take: 4829. ', '4829'],
		['take4829', '4829'],
		['TAKE  4829', '4829'],
		['TAKE\n4829', '4829'],
		['TAKE 48 29', '4829'],
		['TAKE 4 8 2 9', '4829'],
		['take #4829', '4829'],
		['TAKE 482923', '482923'],
		['TAKE 4829, there in 5', '4829'],
		['TAKE 48 29, there in 5', '4829'],
		['TAKE 4829 4829', '4829'],
		['TAKE', null],
		[' take. ', null],
		['Take!', null]
	])('%j takes %s', (text, code) => {
		expect(readStaffReply(text)).toEqual({ kind: 'take', code });
	});

	it.each([
		'TAKE 482',
		'TAKE 4829234',
		'TAKE 48 2',
		'TAKE 4829 or 4823',
		'take 4829 take 4823',
		'TAKE 4829? No, I cannot',
		"take 4829 - I can't",
		'take no',
		'TAKE it over please'
	])('%j is asked back', (text) => {
		expect(readStaffReply(text)).toEqual({ kind: 'unclear' });
	});

	it.each([
		'',
		'4829',
		'will take 4829',
		'not take 4829',
		'taken 4829',
		'ok coming',
		'PASS 4829',
		'intake 4829'
	])('%j takes nothing', (text) => {
		expect(readStaffReply(text)).toEqual({ kind: 'other' });
	});

	it('property: never throws, and never reads a code that was not typed', () => {
		fc.assert(
			fc.property(fc.string({ unit: 'binary' }), (text) => {
				const reply = readStaffReply(`take ${text}`);
				const code = reply.kind === 'take' ? (reply.code ?? '') : '';
				expect(text.normalize('NFKD').replace(/\D/g, '')).toContain(code);
			})
		);
	});
});

describe('newReplyCode', () => {
	const codes = fc.array(fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }), { minLength: 6 });
	const cycling = (numbers: number[]) => {
		let at = -1;
		return () => numbers[(at += 1) % numbers.length] ?? 0;
	};

	it.each([
		[[0], '2222'],
		[[0.125, 0.25, 0.5, 0.75], '3468'],
		[[1 - Number.EPSILON], '9999']
	])('%j gives %s', (numbers, code) => {
		expect(newReplyCode(new Set(), cycling(numbers))).toBe(code);
	});

	it('property: four digits without 0 and 1, and a reply with it is understood', () => {
		fc.assert(
			fc.property(codes, (numbers) => {
				const code = newReplyCode(new Set(), cycling(numbers));
				expect(code).toMatch(/^[2-9]{4}$/);
				expect(readStaffReply(`take ${code}`)).toEqual({ kind: 'take', code });
			})
		);
	});

	it('draws again when a code is in use, and takes a longer one when chance finds none', () => {
		expect(newReplyCode(new Set(['2222']), cycling([0, 0, 0, 0, 0.5, 0.5, 0.5, 0.5]))).toBe('6666');
		expect(newReplyCode(new Set(['2222']), () => 0)).toBe('22222');
		expect(newReplyCode(new Set(['2222', '22222']), () => 0)).toBe('222222');
		expect(() => newReplyCode(new Set(['2222', '22222', '222222']), () => 0)).toThrow('3 are in use');
	});
});
