declare module 'subset-font' {
	/** A font with the glyphs of these letters alone; without `keepFeatures` all that it can do is kept. */
	export default function subsetFont(
		font: Buffer,
		letters: string,
		options: { targetFormat: 'sfnt' | 'woff' | 'woff2'; keepFeatures?: readonly string[] }
	): Promise<Buffer>;
}

declare module 'fontverter' {
	const fontverter: { convert(font: Buffer, format: 'sfnt' | 'woff' | 'woff2'): Promise<Buffer> };
	export default fontverter;
}
