import { render } from 'svelte/server';
import { describe, expect, it } from 'vitest';
import PointMark from './PointMark.svelte';
import type { MarkShape, PlotPoint } from './plot';

/** What is left of a mark for who sees no colours: its shapes, without any class. */
const drawn = (shape: MarkShape, verdict: PlotPoint['verdict']) =>
	render(PointMark, { props: { shape, verdict } })
		.body.replace(/<!--.*?-->/g, '')
		.replace(/ class="[^"]*"/g, '');

describe('the marks of a point', () => {
	it.each(['disc', 'ring', 'square'] as const)(
		'tell stop, caution and neither apart by shape: %s',
		(shape) => {
			const marks = ([null, 'caution', 'stop'] as const).map((verdict) => drawn(shape, verdict));
			expect(new Set(marks).size).toBe(3);
		}
	);

	it('are no alarm shape: an escalation alone has the triangle and the diamond', () => {
		expect(drawn('disc', 'stop')).not.toContain('path');
	});
});
