import { describe, expect, it } from 'vitest';
import { Mutex } from './mutex';

describe('the lock', () => {
	it('lets one in at a time, in the order in which they came', async () => {
		const mutex = new Mutex();
		const seen: string[] = [];
		const work = (name: string) =>
			mutex.run(async () => {
				seen.push(`${name} in`);
				await Promise.resolve();
				seen.push(`${name} out`);
			});
		await Promise.all([work('a'), work('b'), work('c')]);
		expect(seen).toEqual(['a in', 'a out', 'b in', 'b out', 'c in', 'c out']);
	});

	it('lets the event loop turn between two holders', async () => {
		const mutex = new Mutex();
		const seen: string[] = [];
		const work = (name: string) =>
			mutex.run(() => {
				seen.push(name);
				setImmediate(() => seen.push(`turn after ${name}`));
				return Promise.resolve();
			});
		await Promise.all([work('a'), work('b'), work('c')]);
		expect(seen.slice(0, 5)).toEqual(['a', 'turn after a', 'b', 'turn after b', 'c']);
	});

	it('lets the event loop turn before the first holder, so that who comes together stands in one row', async () => {
		const mutex = new Mutex();
		const seen: string[] = [];
		const first = mutex.run(() => Promise.resolve(seen.push('first')));
		const rest = Promise.resolve().then(async () => {
			// More turns of the microtask queue than a write without a wait would take.
			for (let n = 0; n < 50; n += 1) {
				await Promise.resolve();
			}
			seen.push('came meanwhile');
			await mutex.run(() => Promise.resolve(seen.push('second')));
		});
		await Promise.all([first, rest]);
		expect(seen).toEqual(['came meanwhile', 'first', 'second']);
	});

	it('is free after work that failed, and after a release that came twice', async () => {
		const mutex = new Mutex();
		await expect(mutex.run(() => Promise.reject(new Error('no')))).rejects.toThrow('no');
		const release = await mutex.acquire();
		const next = mutex.acquire();
		release();
		release();
		expect(await next).toEqual(expect.any(Function));
	});
});
