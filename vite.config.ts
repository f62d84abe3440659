import { paraglideVitePlugin } from '@inlang/paraglide-js';
import { sveltekit } from '@sveltejs/kit/vite';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'vitest/config';

export default defineConfig({
	plugins: [
		tailwindcss(),
		paraglideVitePlugin({
			project: './src/lib/i18n/project.inlang',
			outdir: './src/lib/i18n/paraglide',
			strategy: ['cookie', 'baseLocale']
		}),
		sveltekit()
	],
	build: {
		rolldownOptions: {
			// A wrong path to the message plugin builds without words and without an error. Make it one.
			onwarn(warning, warn) {
				if (warning.code === 'IMPORT_IS_UNDEFINED' || warning.code === 'MISSING_EXPORT') {
					throw new Error(warning.message);
				}
				warn(warning);
			}
		}
	},
	test: {
		expect: { requireAssertions: true },
		// A core is left free otherwise, which on a machine of two is every other one.
		maxWorkers: '100%',
		// Something of the plug-ins now and then keeps the process open once all is over; ten seconds wait for nothing.
		teardownTimeout: 1_000,
		projects: [
			{
				extends: true,
				test: {
					name: 'unit',
					environment: 'node',
					include: ['src/**/*.test.ts', 'tests/unit/**/*.test.ts'],
					// Some read the whole tree, or cut the faces anew; a busy machine is no reason to fail.
					testTimeout: 30_000,
					// They keep nothing: to load the rules anew for each file took most of the time.
					isolate: false
				}
			},
			{
				extends: true,
				test: {
					name: 'integration',
					environment: 'node',
					include: ['tests/integration/**/*.test.ts'],
					isolate: false,
					setupFiles: ['tests/support/fresh-modules.ts'],
					testTimeout: 30_000,
					hookTimeout: 60_000
				}
			},
			{
				// Over HTTP against the production build; `npm test` builds first.
				extends: true,
				test: {
					name: 'product',
					environment: 'node',
					include: ['tests/product/**/*.test.ts'],
					testTimeout: 60_000,
					hookTimeout: 180_000
				}
			}
		]
	}
});
