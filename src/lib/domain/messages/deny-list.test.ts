import { describe, expect, it } from 'vitest';
import { DENIED, deniedWords } from './deny-list';

describe('deniedWords', () => {
	it.each([
		['The Heart Centre', ['heart']],
		['Cardiac Surgery', ['cardi', 'surg']],
		['cardiothoracic', ['cardi']],
		['CABG x3 on warfarin', ['cabg', 'warfarin']],
		['Blood pressure 88/50', ['blood', 'pressure']],
		['ÉCHO, Ischémie', ['echo', 'ischem']],
		['physio-rehab', ['physio', 'rehab']],
		['beta-blocker', ['beta-block']],
		['INR 3.4', ['inr']],
		['post_surgery', ['surg']],
		['post-surgery', ['surg']]
	])('%j', (text, expected) => {
		expect(deniedWords(text)).toEqual(expected);
	});

	it.each([
		'Saltmarsh General',
		'Saltmarsh Medical Centre',
		'East Gym',
		'Heron Unit',
		'Tern Ward, bed 4',
		'Latest news',
		'Western Quay, room 2',
		'consistent, discuss, multitude'
	])('%s may leave', (text) => {
		expect(deniedWords(text)).toEqual([]);
	});

	it('every entry is found by itself, and written as it is compared', () => {
		for (const word of Object.values(DENIED).flat()) {
			expect(deniedWords(`x ${word}`)).toHaveLength(1);
			expect(word).toBe(word.toLowerCase().normalize('NFKD'));
		}
	});

	it('holds the three words that nobody may forget', () => {
		for (const word of ['heart', 'cardiac', 'surgery']) {
			expect(deniedWords(word)).not.toEqual([]);
		}
	});
});
