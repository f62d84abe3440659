import { describe, expect, it } from 'vitest';
import { invalidField, Problem } from './errors';
import { Refusals } from './refusals';

async function gathered(...problems: Problem[]): Promise<unknown> {
	const refusals = new Refusals();
	for (const problem of problems) {
		expect(
			await refusals.of(() => {
				throw problem;
			})
		).toBeNull();
	}
	try {
		refusals.throwIfAny();
	} catch (thrown) {
		return thrown;
	}
	return null;
}

const PHONE = invalidField('/patient/phone', 'No number.');
const BED = new Problem('bed-in-use', 'Bed T9 is in use.', { episodeId: 'e' });

describe('Refusals', () => {
	it('passes on what a check answers', async () => {
		expect(await new Refusals().of(() => Promise.resolve(7))).toBe(7);
		expect(await gathered()).toBeNull();
	});

	it('throws the only problem as it is', async () => {
		expect(await gathered(BED)).toBe(BED);
	});

	it('names every field when there are several', async () => {
		expect(await gathered(PHONE, BED)).toMatchObject({
			code: 'invalid',
			detail: 'No number. Bed T9 is in use.',
			extra: {
				episodeId: 'e',
				errors: [
					{ pointer: '/patient/phone', message: 'No number.' },
					{ pointer: '/bed', message: 'Bed T9 is in use.' }
				]
			}
		});
	});

	it('lets a bug through', async () => {
		const bug = new Refusals().of(() => Promise.reject(new TypeError('a bug')));
		await expect(bug).rejects.toThrow('a bug');
	});
});
