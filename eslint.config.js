import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import svelte from 'eslint-plugin-svelte';
import globals from 'globals';
import ts from 'typescript-eslint';
import svelteConfig from './svelte.config.js';

/**
 * Data flows one way: routes -> server -> domain, and components -> client -> domain.
 * Each room lists what it must not import. SvelteKit's own check for leaked server modules is off in unit
 * tests, so it is written down here. `tests/unit/imports.test.ts` holds good and bad samples for each row.
 */
const ROOMS = [
	{
		files: ['src/lib/domain/**/*.ts'],
		ban: ['server', 'client', 'components', 'i18n', 'routes'],
		kit: true,
		node: true
	},
	{ files: ['src/lib/server/**/*.ts'], ban: ['client', 'components'], kit: false, node: false },
	{ files: ['src/lib/client/**/*.ts'], ban: ['server', 'components'], kit: false, node: true },
	{
		files: ['src/lib/components/**/*.{ts,svelte}', 'src/routes/**/*.svelte'],
		ban: ['server'],
		kit: false,
		node: true
	},
	{
		files: ['src/lib/components/{ui,form,rope}/**/*.{ts,svelte}'],
		ban: ['server', 'domain', 'client'],
		kit: false,
		node: true
	},
	{ files: ['src/routes/**/*.ts', 'src/hooks.server.ts'], ban: ['server/db'], kit: false, node: false },
	{ files: ['src/fakes/**/*.ts'], ban: ['server', 'client', 'components', 'domain'], kit: true, node: false }
];

/** @type {import('eslint').Linter.Config[]} */
const roomRules = ROOMS.map(({ files, ban, kit, node }) => ({
	files,
	rules: {
		'no-restricted-imports': [
			'error',
			{
				patterns: [
					...ban.map((room) => ({
						regex: `(^\\$lib/${room}(/|$))|(\\.\\./(.*/)?${room}(/|$))`,
						message: `This room may not import ${room}: see the table in eslint.config.js.`
					})),
					...(kit
						? [{ regex: '^(\\$app|\\$env|@sveltejs)/', message: 'This room knows no framework.' }]
						: []),
					...(node ? [{ regex: '^node:', message: 'This room runs in the browser too.' }] : []),
					...(ban.includes('server') || ban.includes('server/db')
						? [{ regex: '^(drizzle-orm|@libsql/)', message: 'Only the server room speaks SQL.' }]
						: [])
				]
			}
		]
	}
}));

/** One module reads the wall clock, so that tests and the demonstration can move it. */
const CLOCK = [
	{
		selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
		message: 'Read the time from $lib/server/clock (or take it as an argument).'
	},
	{
		selector: "NewExpression[callee.name='Date'][arguments.length=0]",
		message: 'Read the time from $lib/server/clock (or take it as an argument).'
	}
];

export default ts.config(
	{
		ignores: [
			'build/',
			'.svelte-kit/',
			'node_modules/',
			'data/',
			'src/lib/i18n/paraglide/',
			'test-results/',
			'playwright-report/'
		]
	},
	js.configs.recommended,
	...ts.configs.recommended,
	...svelte.configs.recommended,
	prettier,
	...svelte.configs.prettier,
	{
		languageOptions: { globals: { ...globals.browser, ...globals.node } },
		rules: {
			// TypeScript finds undefined names itself.
			'no-undef': 'off',
			curly: 'error',
			eqeqeq: ['error', 'always', { null: 'ignore' }],
			'no-console': 'error',
			'@typescript-eslint/consistent-type-imports': 'error',
			'@typescript-eslint/no-explicit-any': 'error',
			'@typescript-eslint/no-non-null-assertion': 'error',
			'@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
			// Every internal address comes from $lib/routes.ts; the product is always served from the root.
			'svelte/no-navigation-without-resolve': 'off',
			'svelte/require-each-key': 'error'
		}
	},
	{
		files: ['**/*.svelte', '**/*.svelte.ts'],
		languageOptions: { parserOptions: { parser: ts.parser, extraFileExtensions: ['.svelte'], svelteConfig } },
		rules: { 'svelte/button-has-type': 'error' }
	},
	{
		files: ['src/**/*.ts', 'src/**/*.svelte'],
		ignores: ['src/lib/server/clock.ts', 'src/lib/client/**', 'src/fakes/**', 'src/**/*.test.ts'],
		rules: { 'no-restricted-syntax': ['error', ...CLOCK] }
	},
	{
		files: ['src/lib/server/**/*.ts', 'src/hooks.server.ts'],
		languageOptions: { parserOptions: { projectService: true } },
		rules: {
			'@typescript-eslint/no-floating-promises': 'error',
			'@typescript-eslint/await-thenable': 'error',
			'@typescript-eslint/no-misused-promises': 'error',
			'@typescript-eslint/switch-exhaustiveness-check': [
				'error',
				{ considerDefaultExhaustiveForUnions: true }
			]
		}
	},
	{ files: ['src/cli/**', 'src/fakes/**', 'tests/**'], rules: { 'no-console': 'off' } },
	...roomRules
);
