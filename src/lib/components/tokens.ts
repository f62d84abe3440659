/**
 * The look of the product in numbers, declared once. `tailwind.config.ts` turns these tables into classes and
 * into one CSS variable per colour and theme; `tokens.test.ts` measures their contrast. Nothing else in the
 * repository names a colour.
 */

/** Paper by day, tar by night: the colours of one theme, as `#rrggbb`. */
export type Palette = Record<ColourName, string>;

export const COLOUR_NAMES = [
	// Ground, the nameboard laid on it, and wells cut into it.
	'canvas',
	'raised',
	'sunk',
	// Thin lines. Decoration only: too pale to carry meaning.
	'rule',
	// Text, and text that steps back.
	'ink',
	'soft',
	// The rope's whipping (decoration only), and the same dye dark enough to be read.
	'hemp',
	'hemp-ink',
	// Strands: medical, nursing, therapy.
	'woad',
	'moss',
	'heather',
	// Alarm colours after IEC 60601-1-8, for escalations and stops alone, each with its ground.
	'high',
	'medium',
	'low',
	'high-ground',
	'medium-ground',
	'low-ground',
	// What the far side of a strand darkens towards, and the yarn that catches the light.
	'shade',
	'yarn'
] as const;
export type ColourName = (typeof COLOUR_NAMES)[number];

export const DAY: Palette = {
	canvas: '#f4f0e6',
	raised: '#fbf9f3',
	sunk: '#eae3d4',
	rule: '#d9cfba',
	ink: '#1b2623',
	soft: '#535d57',
	hemp: '#b4976a',
	'hemp-ink': '#75592b',
	woad: '#2c5a88',
	moss: '#456b3b',
	heather: '#774b83',
	high: '#b0231b',
	medium: '#7a5600',
	low: '#0a656e',
	'high-ground': '#f9e3de',
	'medium-ground': '#f7e7b8',
	'low-ground': '#d8edec',
	shade: '#1b2623',
	yarn: '#f4f0e6'
};

export const NIGHT: Palette = {
	canvas: '#121816',
	raised: '#1a221f',
	sunk: '#0d1210',
	rule: '#33403a',
	ink: '#e4decf',
	soft: '#a3aba3',
	hemp: '#8e774f',
	'hemp-ink': '#cdb27f',
	woad: '#86b4de',
	moss: '#97c08a',
	heather: '#c9a0d4',
	high: '#ff9085',
	medium: '#e9c25a',
	low: '#6fc6cc',
	'high-ground': '#3a1714',
	'medium-ground': '#33290f',
	'low-ground': '#0f2b2d',
	shade: '#121816',
	yarn: '#121816'
};

/** How far the strands of the rope are dyed towards the ground: by night nothing is brighter than it need be. */
export const DIM = { day: '0%', night: '22%' } as const;

export const THEMES = { day: DAY, night: NIGHT } as const;
export type ThemeName = keyof typeof THEMES;

/**
 * System colours for people whose device forces its own. Marks that mean something keep their shape and word. All
 * of them stand here: browsers force text, edges and grounds, but leave what an SVG is painted with alone.
 */
export const FORCED: Palette = {
	canvas: 'Canvas',
	raised: 'Canvas',
	sunk: 'Canvas',
	rule: 'CanvasText',
	ink: 'CanvasText',
	soft: 'CanvasText',
	hemp: 'CanvasText',
	'hemp-ink': 'CanvasText',
	woad: 'CanvasText',
	moss: 'CanvasText',
	heather: 'CanvasText',
	high: 'CanvasText',
	medium: 'CanvasText',
	low: 'CanvasText',
	'high-ground': 'Canvas',
	'medium-ground': 'Canvas',
	'low-ground': 'Canvas',
	shade: 'Canvas',
	yarn: 'Canvas'
};

/** Colours that text is written in, on each of the grounds it may stand on. */
export const TEXT_PAIRS: readonly (readonly [text: ColourName, ground: ColourName])[] = [
	...(['canvas', 'raised', 'sunk'] as const).flatMap((ground) =>
		(['ink', 'soft', 'hemp-ink', 'woad', 'moss', 'heather', 'high', 'medium', 'low'] as const).map(
			(text) => [text, ground] as const
		)
	),
	['ink', 'high-ground'],
	['ink', 'medium-ground'],
	['ink', 'low-ground'],
	['soft', 'high-ground'],
	['soft', 'medium-ground'],
	['soft', 'low-ground'],
	['high', 'high-ground'],
	['medium', 'medium-ground'],
	['low', 'low-ground'],
	// Words on a filled button: the ground shows through.
	['canvas', 'ink'],
	['canvas', 'high'],
	['canvas', 'medium'],
	['canvas', 'low']
];

/** Lines and shapes that carry meaning: edges of inputs, focus, the place one is in, alarm shapes, strands. */
export const MARK_PAIRS: readonly (readonly [mark: ColourName, ground: ColourName])[] = (
	['canvas', 'raised', 'sunk'] as const
).flatMap((ground) =>
	(['ink', 'soft', 'hemp-ink', 'woad', 'moss', 'heather', 'high', 'medium', 'low'] as const).map(
		(mark) => [mark, ground] as const
	)
);

/** Font size and line height. Sizes are in rem, so that text set to 200 % grows with the reader's wish. */
export const TYPE: Record<string, [size: string, lineHeight: string]> = {
	fine: ['0.875rem', '1.25rem'],
	body: ['1rem', '1.5rem'],
	row: ['1.125rem', '1.5rem'],
	title: ['1.25rem', '1.625rem'],
	/** The one large action of a phone page. */
	take: ['1.75rem', '2rem'],
	head: ['1.9375rem', '2.25rem'],
	figure: ['2.25rem', '2.5rem'],
	hero: ['clamp(2.75rem, 1.9rem + 3.6vw, 4.25rem)', '1.04']
};

/** Three weights only: what is written, what is said, what matters. */
export const WEIGHT = { normal: '400', bold: '700', black: '900' };

/** Distances beside Tailwind's own steps of 4 px. `touch` is the least side of anything a finger meets. */
export const SPACE = { touch: '2.75rem', thumb: '4rem', gutter: '1.375rem', margin: '2rem' };

/** Corners: buttons and inputs, and the large actions of a phone. */
export const RADIUS = { none: '0', hair: '3px', DEFAULT: '7px', phone: '12px', full: '9999px' };

/** Motion is only for something that has changed. `app.css` stops it for people who ask for none. */
export const MOTION = {
	duration: { DEFAULT: '120ms', quick: '120ms', settle: '240ms' },
	ease: { DEFAULT: 'cubic-bezier(0.2, 0, 0, 1)' },
	/** To and fro along a line three times as long. */
	underWay: {
		animation: 'under-way 1.6s ease-in-out infinite alternate',
		keyframes: { from: { transform: 'translateX(0)' }, to: { transform: 'translateX(200%)' } }
	}
};

/** Relative luminance of an `#rrggbb` colour, 0 to 1, after WCAG 2.2. */
export function luminance(hex: string): number {
	const [r, g, b] = [1, 3, 5].map((at) => {
		const part = parseInt(hex.slice(at, at + 2), 16) / 255;
		return part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
	}) as [number, number, number];
	return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** Contrast of two `#rrggbb` colours, 1 to 21, after WCAG 2.2. */
export function contrast(one: string, other: string): number {
	const [dark, light] = [luminance(one), luminance(other)].sort((a, b) => a - b) as [number, number];
	return (light + 0.05) / (dark + 0.05);
}
