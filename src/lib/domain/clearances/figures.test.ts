import { describe, expect, it } from 'vitest';
import { figuresIn } from './figures';

describe('figuresIn', () => {
	it.each<[string, string[]]>([
		['May she walk on the treadmill, level, 2.5 km/h to begin with?', ['2.5 km/h']],
		['Level, 2,5 km/h, ten minutes?', ['2,5 km/h']],
		['Treadmill at 1.2 mph, 5% for 8 min?', ['1.2 mph', '5%', '8 min']],
		['Arms to 90 degrees, 1 kg at most.', ['90 degrees', '1 kg']],
		['Arms to 90° please', ['90°']],
		['Bicycle 25 W, then 25 W again', ['25 W']],
		['Sips of 5 ml, ten times', ['5 ml']],
		['Corridor, 60 m with one helper', ['60 m']],
		['Four weeks, exertion 12, level 5. May the stairs start?', []],
		['Day 3, bed T4, 64 years, saturation 95', []],
		['', []]
	])('%s: %j', (words, figures) => {
		expect(figuresIn(words)).toEqual(figures);
	});
});
