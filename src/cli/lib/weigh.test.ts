import { describe, expect, it } from 'vitest';
import { pagesOf, weightsOf } from './weigh.mjs';

const GENERATED = '.svelte-kit/generated/client-optimized';

describe('the weight of a page', () => {
	it('reads which nodes a page is made of', () => {
		const source = `export const dictionary = {
			"/(public)": [~38],
			"/(app)/loose-ends": [16,[2]],
			"/(app)/patients/[id]": [~18,[2,3]],
			"/(patient)/p/[token]": [~36,[4],[5]]
		};`;
		expect(pagesOf(source)).toEqual({
			'/(public)': [0, 1, 38],
			'/(app)/loose-ends': [0, 1, 2, 16],
			'/(app)/patients/[id]': [0, 1, 2, 3, 18],
			'/(patient)/p/[token]': [0, 1, 4, 36]
		});
	});

	const manifest = {
		'node_modules/kit/client/entry.js': { file: 'start.js', imports: ['_a.js'] },
		[`${GENERATED}/app.js`]: { file: 'app.js', imports: ['_a.js'] },
		[`${GENERATED}/nodes/0.js`]: { file: '0.js', imports: ['_a.js', '_b.js'] },
		[`${GENERATED}/nodes/2.js`]: { file: '2.js' },
		[`${GENERATED}/nodes/9.js`]: { file: '9.js', imports: ['_b.js'] },
		'_a.js': { file: 'a.js' },
		'_b.js': { file: 'b.js', imports: ['_a.js'] }
	};

	it('counts every chunk once, also what a chunk of a chunk imports', () => {
		const kib: Record<string, number> = { 'a.js': 64, 'b.js': 32 };
		const weights = weightsOf(
			manifest,
			{ '/(app)/ward': [0, 2, 9], '/(app)/loose-ends': [0, 2], '/(public)': [0] },
			(file) => kib[file] ?? 1
		);
		expect(weights).toEqual([
			{ page: '/(app)/ward', kib: 101, most: 160 },
			{ page: '/(app)/loose-ends', kib: 100, most: 120 },
			{ page: '/(public)', kib: 99, most: 120 }
		]);
	});

	it('does not weigh what the build does not have', () => {
		expect(() => weightsOf(manifest, { '/(app)/cover': [0, 14] }, () => 1)).toThrow(/nodes\/14\.js/);
	});
});
