import { describe, expect, it } from 'vitest';
import { closingLine, countLine, countPlaywright, countsOf, countVitest, sum } from './counts.mjs';

describe('countVitest', () => {
	it('counts a file that could not be loaded as one failure', () => {
		const report = {
			numPassedTests: 5,
			numFailedTests: 1,
			numPendingTests: 2,
			numTodoTests: 1,
			testResults: [
				{ status: 'passed', assertionResults: [{ status: 'passed' }] },
				{ status: 'failed', assertionResults: [{ status: 'failed' }] },
				{ status: 'failed', assertionResults: [] }
			]
		};
		expect(countVitest(report)).toEqual({ passed: 5, failed: 2, skipped: 3 });
	});
});

describe('countPlaywright', () => {
	it('counts a journey that passed at the second try as failed', () => {
		const stats = { expected: 4, unexpected: 1, flaky: 1, skipped: 2 };
		expect(countPlaywright({ stats })).toEqual({ passed: 4, failed: 2, skipped: 2 });
	});
});

describe('countLine', () => {
	it.each([
		['the only line', '3 passed, 0 failed\n', { passed: 3, failed: 0, skipped: 0 }],
		[
			'the last of two',
			'1 passed, 1 failed\nmore\n2 passed, 0 failed\n',
			{ passed: 2, failed: 0, skipped: 0 }
		],
		['skipped ones', 'x\n2 passed, 1 failed, 4 skipped', { passed: 2, failed: 1, skipped: 4 }]
	])('reads %s', (_what, output, counts) => {
		expect(countLine(output)).toEqual(counts);
	});

	it('says so when there is none', () => {
		expect(() => countLine('all is well: 3 passed, 0 failed')).toThrow('no line');
	});
});

describe('countsOf', () => {
	const clean = { passed: 3, failed: 0, skipped: 1 };

	it.each([
		['its counts when it ended well', 0, clean, clean],
		['one failure when it ended badly and counted none', 1, clean, { ...clean, failed: 1 }],
		['its own failures when it ended badly', 1, { ...clean, failed: 2 }, { ...clean, failed: 2 }]
	])('gives %s', (_what, code, counts, expected) => {
		expect(countsOf(code, () => counts)).toEqual(expected);
	});

	it('gives one failure when nothing could be read, however it ended', () => {
		const read = () => {
			throw new Error('no report');
		};
		expect(countsOf(0, read)).toEqual({ passed: 0, failed: 1, skipped: 0 });
	});
});

describe('closingLine', () => {
	it.each([
		[{ passed: 12, failed: 0, skipped: 0 }, '12 passed, 0 failed'],
		[{ passed: 12, failed: 1, skipped: 2 }, '12 passed, 1 failed, 2 skipped']
	])('writes %o', (counts, line) => {
		expect(closingLine(counts)).toBe(line);
	});

	it('adds up', () => {
		const one = { passed: 1, failed: 2, skipped: 3 };
		expect(sum([one, one])).toEqual({ passed: 2, failed: 4, skipped: 6 });
	});
});
