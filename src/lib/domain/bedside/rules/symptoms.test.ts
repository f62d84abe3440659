import { describe, expect, it } from 'vitest';
import { SYMPTOMS, type SymptomCode } from '../codes';
import { grades, judge, only } from '../testing/sample';

const STOPS: SymptomCode[] = [
	// Inpatient stop criteria as given in study notes (secondary).
	'angina',
	'dizziness',
	'light-headedness',
	'fainting',
	// Heart Online, exercise following cardiac interventions (published).
	'sternal-click',
	// Critical Care Research and Practice 2020, early mobilisation, table 6 (published).
	'new-bleeding',
	// Common practice, no published source.
	'confusion',
	'pallor',
	'distress',
	'line-dislodged'
];
/** Common practice, no published source. */
const CAUTIONS = SYMPTOMS.filter((code) => !STOPS.includes(code));

describe('symptom', () => {
	it.each(STOPS)('%s stops, as a word and with any grade', (code) => {
		for (const symptom of [code, { code, grade: 1 }, { code, grade: 4 }]) {
			const verdict = judge({ symptoms: [symptom] });
			expect(grades(verdict, 'symptom')).toEqual(['stop during']);
			expect(verdict.outcome).toBe('stop');
		}
	});

	it.each(CAUTIONS)('%s cautions as a word and when slight', (code) => {
		for (const symptom of [code, { code, grade: 1 }, { code, grade: 2 }]) {
			const verdict = judge({ symptoms: [symptom] });
			expect(grades(verdict, 'symptom')).toEqual(['caution during']);
			expect(verdict.outcome).toBe('caution');
		}
	});

	// The scale of breathlessness from 1 to 4: ACSM, from memory. That grade 3 stops: common practice, no published source.
	it.each([
		[1, 'caution'],
		[2, 'caution'],
		[2.9, 'caution'],
		[3, 'stop'],
		[4, 'stop']
	])('breathlessness of grade %d: %s', (grade, expected) => {
		expect(grades(judge({ symptoms: [{ code: 'breathlessness', grade }] }), 'symptom')).toEqual([
			`${expected} during`
		]);
	});

	it.each([
		[['breathlessness' as const, { code: 'breathlessness' as const, grade: 4 }]],
		[[{ code: 'breathlessness' as const, grade: 4 }, 'breathlessness' as const]],
		[
			[
				{ code: 'breathlessness' as const, grade: 2 },
				{ code: 'breathlessness' as const, grade: 4 }
			]
		],
		[
			[
				{ code: 'breathlessness' as const, grade: 4 },
				{ code: 'breathlessness' as const, grade: 2 }
			]
		]
	])('named twice counts once, with the graver grade: %j', (symptoms) => {
		expect(only(judge({ symptoms }), 'symptom')).toMatchObject({
			grade: 'stop',
			measured: 'breathlessness',
			limit: 3
		});
	});

	// Common practice, no published source.
	it('before anything was done reads as a reason not to start', () => {
		const nothing = { hr: null, sbp: null, dbp: null, spo2: null, rr: null, pain: null };
		const verdict = judge({ symptoms: ['angina'], during: [], after: nothing });
		expect(grades(verdict, 'symptom')).toEqual(['stop before']);
	});
});
