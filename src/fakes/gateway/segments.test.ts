import { expect, it } from 'vitest';
import { segmentsOf } from './segments';

// Lengths of one and of joined messages: 3GPP TS 23.040, 160/153 septets and 70/67 UCS-2 units.
it.each([
	['160 letters', 'a'.repeat(160), 1],
	['161 letters', 'a'.repeat(161), 2],
	['306 letters', 'a'.repeat(306), 2],
	['307 letters', 'a'.repeat(307), 3],
	['80 euro signs, two places each', '€'.repeat(80), 1],
	['81 euro signs', '€'.repeat(81), 2],
	['70 letters outside the alphabet', 'ő'.repeat(70), 1],
	['71 letters outside the alphabet', 'ő'.repeat(71), 2],
	['35 pictures of two units', '🙂'.repeat(35), 1],
	['36 pictures of two units', '🙂'.repeat(36), 2]
])('counts %s', (_what, body, segments) => {
	expect(segmentsOf(body)).toBe(segments);
});
