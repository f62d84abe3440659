import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import type { Page } from '@playwright/test';

/** Keeps a picture small enough for the front page: the browser that took it writes it anew. */
export async function keepAsWebp(page: Page, png: Buffer, file: string): Promise<void> {
	const dataUrl = await page.evaluate(
		async (source) => {
			const image = new Image();
			image.src = source;
			await image.decode();
			const canvas = document.createElement('canvas');
			canvas.width = image.width;
			canvas.height = image.height;
			canvas.getContext('2d')?.drawImage(image, 0, 0);
			return canvas.toDataURL('image/webp', 0.82);
		},
		`data:image/png;base64,${png.toString('base64')}`
	);
	mkdirSync(path.dirname(file), { recursive: true });
	writeFileSync(file, Buffer.from(dataUrl.slice(dataUrl.indexOf(',') + 1), 'base64'));
}
