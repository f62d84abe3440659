import { describe, expect, it } from 'vitest';
import { checkField, doubtWords, faultWords, valueOf } from './fields';

// Hard and usual bounds: common practice, no published source.
describe('checkField', () => {
	it.each([
		['hr', '', 'empty'],
		['hr', ' ', 'empty'],
		['hr', '12o', 'unreadable'],
		['hr', '19', 'impossible'],
		['hr', '20', 'doubtful'],
		['hr', '39', 'doubtful'],
		['hr', '40', 'fine'],
		['hr', '150', 'fine'],
		['hr', '151', 'doubtful'],
		['hr', '250', 'doubtful'],
		['hr', '251', 'impossible'],
		['sbp', '49', 'impossible'],
		['sbp', '80', 'fine'],
		['sbp', '79.5', 'doubtful'],
		['sbp', '200', 'fine'],
		['sbp', '201', 'doubtful'],
		['dbp', '120', 'fine'],
		['dbp', '121', 'doubtful'],
		['spo2', '84', 'doubtful'],
		['spo2', '85', 'fine'],
		['spo2', '101', 'impossible'],
		['rpe', '5', 'impossible'],
		['rpe', '6', 'fine'],
		['temperature', '36,8', 'fine'],
		['temperature', '98', 'impossible'],
		['elevationDeg', '180', 'fine'],
		['elevationDeg', '181', 'impossible']
	] as const)('%s %j is %s', (field, text, kind) => {
		expect(checkField(field, text).kind).toBe(kind);
	});
});

describe('valueOf', () => {
	it.each([
		['128', 128],
		['36,8', null],
		['12o', null],
		['1', null],
		[undefined, null]
	])('of %j as a systolic pressure is %j', (text, value) => {
		expect(valueOf('sbp', text)).toBe(value);
	});
});

describe('what is said about a value', () => {
	it('names value and bounds of what cannot be', () => {
		expect(faultWords('hr', '300')).toBe('300 is not possible here: 20 to 250 beats/min.');
	});

	it.each([
		['101', 'looks like the pulse'],
		['250', 'looks like the pulse'],
		['251', 'is not possible']
	])('takes a saturation of %s for what it probably is', (text, words) => {
		expect(faultWords('spo2', text)).toContain(words);
	});

	it('asks about what is unusual, and about nothing else', () => {
		expect(doubtWords('sbp', '210')).toBe('Really 210? Usual is 80 to 200.');
		expect(doubtWords('sbp', '128')).toBeNull();
		expect(doubtWords('sbp', '12')).toBeNull();
		expect(doubtWords('rpe', '20')).toBeNull();
	});
});
