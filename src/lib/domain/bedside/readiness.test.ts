import { describe, expect, it } from 'vitest';
import { readyToWalk } from './readiness';

const CALM = { chestPain: false, heartFailureSigns: false, newRhythm: false };
const CHECKS = ['chestPain', 'heartFailureSigns', 'newRhythm'] as const;

// Chest pain and rhythm over 8 hours: study notes of the inpatient line (secondary). Heart failure: from memory.
describe('readyToWalk', () => {
	it('is ready when all three were denied', () => {
		expect(readyToWalk(CALM)).toEqual({ ready: true, against: [], open: [] });
	});

	it.each(CHECKS)('%s bars it, and so does not knowing', (check) => {
		const happened = readyToWalk({ ...CALM, [check]: true });
		expect([happened.ready, happened.against.length, happened.open.length]).toEqual([false, 1, 0]);
		const unknown = readyToWalk({ ...CALM, [check]: null });
		expect([unknown.ready, unknown.against.length, unknown.open.length]).toEqual([false, 0, 1]);
	});

	it('gives every reason', () => {
		expect(readyToWalk({ chestPain: true, heartFailureSigns: null, newRhythm: true })).toEqual({
			ready: false,
			against: [
				'Before daily walking: there was chest pain within 8 hours.',
				'Before daily walking: there was a new rhythm or a change of the tracing within 8 hours.'
			],
			open: ['Before daily walking, ask: any new sign that the heart is failing?']
		});
	});
});
