import { describe, expect, it } from 'vitest';
import { assess } from '$lib/domain/bedside/assess';
import type { Phase } from '$lib/domain/bedside/codes';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { session, type Changes } from '$lib/domain/bedside/testing/sample';
import { summaryText } from './summary';

const NOT_MEASURED = { hr: null, sbp: null, dbp: null, spo2: null, rr: null, pain: null };

/** The line of a session with these changes in its thread. */
function line(changes: Changes, phase: Phase = 'inpatient'): string {
	const body: SessionBody = {
		...session(changes),
		level: 3,
		startedAt: '2026-03-02T10:00:00Z',
		endedAt: '2026-03-02T10:20:00Z',
		deviation: null
	};
	return summaryText(body, assess(body), [], phase);
}

describe('the line of a session in its thread', () => {
	it.each([
		['a pressure', { before: { sbp: 84, dbp: 50 } }, 'Do not start: the systolic pressure'],
		['a check', { context: { balloonPump: true } }, 'Do not start: a balloon pump is in place.'],
		['a symptom', { symptoms: ['angina'] }, 'Do not start: the patient has chest pain from the heart.']
	] as [string, Changes, string][])(
		'says of %s before it not to start, never to stop',
		(_, changes, words) => {
			const text = line({ during: [], after: NOT_MEASURED, ...changes });
			expect(text).toContain(words);
			expect(text).not.toMatch(/\bstop/i);
		}
	);

	it('says of what was begun why it stopped', () => {
		const text = line({ symptoms: ['angina'] });
		expect(text).toContain('chest pain from the heart: that is a reason to stop.');
		expect(text).not.toContain('Do not start');
	});

	it.each([
		['inpatient', 'outpatient', 'Sent as inpatient; judged as outpatient, as the record has it.'],
		['outpatient', 'inpatient', 'Sent as outpatient; judged as inpatient, as the record has it.'],
		['outpatient', 'outpatient', null],
		[null, 'outpatient', null]
	] as const)('sent as %s on the record of an %s: %s', (said, phase, words) => {
		const text = line({ context: { phase: said } }, phase);
		expect(text.includes('as the record has it')).toBe(words !== null);
		expect(text).toContain(words ?? '');
	});
});
