import { describe, expect, it } from 'vitest';
import { armAt } from './arm';

describe('armAt', () => {
	it.each([
		[0, 'M14 20L14 37'],
		[60, 'M14 20L28.7 28.5'],
		[90, 'M14 20L31 20'],
		[120, 'M14 20L28.7 11.5'],
		[180, 'M14 20L14 3']
	])('draws an arm raised by %d degrees', (degrees, arm) => {
		expect(armAt(degrees).arm).toBe(arm);
	});

	it('sweeps forwards from hanging down', () => {
		expect(armAt(90).sweep).toBe('M14 20V37A17 17 0 0 0 31 20Z');
	});
});
