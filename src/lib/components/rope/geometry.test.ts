import { describe, expect, it } from 'vitest';
import { halfTurns, LAYS, layRope, whipping, type Lay } from './geometry';

const lay: Lay = LAYS.thread;
const phase = (strand: number, s: number) => (2 * Math.PI * s) / lay.period + (2 * Math.PI * strand) / 3;

/** The point at `t` of the cubic `d`, which holds one move and one curve. */
function pointAt(d: string, t: number): [x: number, s: number] {
	const [x0, s0, x1, s1, x2, s2, x3, s3] = d.match(/-?[\d.]+/g)?.map(Number) as number[] as [
		number,
		number,
		number,
		number,
		number,
		number,
		number,
		number
	];
	const u = 1 - t;
	const mix = (a: number, b: number, c: number, e: number) =>
		u ** 3 * a + 3 * u * u * t * b + 3 * u * t * t * c + t ** 3 * e;
	return [mix(x0, x1, x2, x3), mix(s0, s1, s2, s3)];
}

describe('halfTurns', () => {
	it.each([0, 1, 29, 58, 300])('covers a rope of %d px without a gap, strand by strand', (length) => {
		for (const strand of [0, 1, 2]) {
			const turns = halfTurns(length, lay).filter((turn) => turn.strand === strand);
			expect(turns[0]?.from).toBeLessThanOrEqual(0);
			expect(turns.at(-1)?.to).toBeGreaterThanOrEqual(length);
			turns.slice(1).forEach((turn, index) => expect(turn.from).toBeCloseTo(turns[index]?.to ?? NaN, 9));
		}
	});

	it('is in front exactly where the cosine is positive', () => {
		for (const turn of halfTurns(300, lay)) {
			const middle = phase(turn.strand, (turn.from + turn.to) / 2);
			expect(Math.cos(middle) > 0).toBe(turn.front);
		}
	});

	it('cuts where the cosine changes its sign', () => {
		for (const turn of halfTurns(300, lay)) {
			expect(Math.cos(phase(turn.strand, turn.from))).toBeCloseTo(0, 9);
		}
	});
});

describe('layRope', () => {
	it.each([0, 0.1, 0.25, 0.5, 0.75, 0.9, 1])(
		'follows the sine within two hundredths of the amplitude at t = %d',
		(t) => {
			layRope('thread', 300, 'down').forEach(({ front, back }, strand) => {
				for (const d of [front, back].flatMap((path) => path.match(/M[^M]+/g) ?? [])) {
					const [x, s] = pointAt(d, t);
					expect(Math.abs(x - lay.amplitude * Math.sin(phase(strand, s)))).toBeLessThan(0.02 * lay.amplitude);
				}
			});
		}
	);

	it('lays the same rope once', () => {
		expect(layRope('lane', 120, 'along')).toBe(layRope('lane', 120.2, 'along'));
		expect(layRope('lane', 120, 'along')).not.toBe(layRope('lane', 121, 'along'));
	});

	it.each([-1, NaN, Infinity, 100_001])('refuses a length of %d and names the limit', (length) => {
		expect(() => layRope('lane', length, 'along')).toThrow(/must be from 0 to 100000 px/);
	});

	it.each([0, 100_000])('takes a length of %d', (length) => {
		expect(layRope('lane', length, 'along')).toHaveLength(3);
	});

	it('keeps a lane of six levels under 4000 characters of path, so that sixty of them are light', () => {
		const paths = layRope('lane', 370, 'along');
		expect(paths.map(({ front, back }) => front + back).join('').length).toBeLessThan(4000);
	});
});

describe('whipping', () => {
	it('ties four turns, all across the rope', () => {
		const d = whipping(100, 15);
		expect(d.match(/M-15 [\d.]+L15 [\d.]+/g)).toHaveLength(4);
	});

	it('turns with the axis', () => {
		expect(whipping(100, 15, 'along').match(/M[\d.]+ -15L[\d.]+ 15/g)).toHaveLength(4);
	});
});
