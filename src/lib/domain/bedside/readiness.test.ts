import { describe, expect, it } from 'vitest';
import { readyToWalk } from './readiness';

const CALM = { chestPain: false, heartFailureSigns: false, newRhythm: false };

describe('readyToWalk', () => {
	it('is ready when all three were denied', () => {
		expect(readyToWalk(CALM)).toEqual({ ready: true, reasons: [] });
	});

	it.each(['chestPain', 'heartFailureSigns', 'newRhythm'] as const)(
		'%s bars it, and so does not knowing',
		(check) => {
			for (const answer of [true, null]) {
				const { ready, reasons } = readyToWalk({ ...CALM, [check]: answer });
				expect(ready).toBe(false);
				expect(reasons).toHaveLength(1);
			}
		}
	);

	it('gives every reason', () => {
		expect(readyToWalk({ chestPain: true, heartFailureSigns: null, newRhythm: true }).reasons).toEqual([
			'Chest pain within the last 8 hours.',
			'Nobody has said whether there are signs that the heart is failing.',
			'A new rhythm or a change of the tracing within the last 8 hours.'
		]);
	});
});
