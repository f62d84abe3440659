import type { Config } from 'tailwindcss';
import plugin from 'tailwindcss/plugin';
import {
	COLOUR_NAMES,
	DIM,
	FORCED,
	MOTION,
	RADIUS,
	SPACE,
	THEMES,
	TYPE,
	WEIGHT,
	type ColourName,
	type Palette
} from './src/lib/components/tokens';

/** One CSS variable per colour: `--woad: #2c5a88`. */
function variables(palette: Palette): Record<string, string> {
	return Object.fromEntries(Object.entries(palette).map(([name, value]) => [`--${name}`, value]));
}

const day = { 'color-scheme': 'light', '--dim': DIM.day, ...variables(THEMES.day) };
const night = { 'color-scheme': 'dark', '--dim': DIM.night, ...variables(THEMES.night) };
const forced = { '--dim': DIM.day, ...variables(FORCED) };

/**
 * The device decides between day and night until a person chooses; the choice is `data-theme` on `<html>`, or
 * on any part of a page. Paper is printed by day.
 */
const themes = plugin(({ addBase }) => {
	addBase({
		":root, [data-theme='day']": day,
		'@media (prefers-color-scheme: dark)': { ':root:not([data-theme])': night },
		"[data-theme='night']": night,
		'@media print': { ":root, :root:not([data-theme]), [data-theme='night']": day },
		'@media (forced-colors: active)': { ':root, :root:not([data-theme]), [data-theme]': forced }
	});
});

const colours = Object.fromEntries(COLOUR_NAMES.map((name) => [name, `var(--${name})`])) as Record<
	ColourName,
	string
>;

export default {
	content: ['./src/**/*.{html,svelte,ts}'],
	theme: {
		colors: { ...colours, current: 'currentColor', inherit: 'inherit', transparent: 'transparent' },
		fontFamily: {
			sans: [
				'Ropewalk Sans',
				'Ropewalk Sans fallback',
				'Ropewalk Sans wide fallback',
				'system-ui',
				'sans-serif'
			]
		},
		fontSize: TYPE,
		fontWeight: WEIGHT,
		borderRadius: RADIUS,
		boxShadow: {},
		transitionDuration: MOTION.duration,
		transitionTimingFunction: MOTION.ease,
		extend: {
			spacing: SPACE,
			animation: { 'under-way': MOTION.underWay.animation },
			keyframes: { 'under-way': MOTION.underWay.keyframes }
		}
	},
	plugins: [themes]
} satisfies Config;
