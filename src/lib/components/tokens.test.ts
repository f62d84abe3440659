import { describe, expect, it } from 'vitest';
import config from '../../../tailwind.config';
import { COLOUR_NAMES, contrast, MARK_PAIRS, TEXT_PAIRS, THEMES, type ThemeName } from './tokens';

const themes = Object.keys(THEMES) as ThemeName[];
const textCases = themes.flatMap((theme) =>
	TEXT_PAIRS.map(([text, ground]) => [theme, text, ground] as const)
);
const markCases = themes.flatMap((theme) =>
	MARK_PAIRS.map(([mark, ground]) => [theme, mark, ground] as const)
);

describe('contrast of the tokens', () => {
	// 4.5:1 for text and 3:1 for marks: WCAG 2.2, success criteria 1.4.3 and 1.4.11.
	it.each(textCases)('%s: %s is readable on %s', (theme, text, ground) => {
		expect(contrast(THEMES[theme][text], THEMES[theme][ground])).toBeGreaterThanOrEqual(4.5);
	});

	it.each(markCases)('%s: %s is seen on %s', (theme, mark, ground) => {
		expect(contrast(THEMES[theme][mark], THEMES[theme][ground])).toBeGreaterThanOrEqual(3);
	});

	it.each([
		// Black on white is 21:1 and a colour on itself 1:1 by definition (WCAG 2.2, contrast ratio).
		['#000000', '#ffffff', 21],
		['#ffffff', '#000000', 21],
		['#456b3b', '#456b3b', 1],
		// Published as the palest grey that passes 4.5:1 on white (WebAIM, contrast and color accessibility).
		['#767676', '#ffffff', 4.54]
	])('contrast of %s on %s is %d', (one, other, expected) => {
		expect(contrast(one, other)).toBeCloseTo(expected, 2);
	});
});

describe('the Tailwind configuration', () => {
	it('offers every colour token and no other colour', () => {
		const offered = Object.keys(config.theme.colors);
		expect(offered.sort()).toEqual([...COLOUR_NAMES, 'current', 'inherit', 'transparent'].sort());
	});
});
