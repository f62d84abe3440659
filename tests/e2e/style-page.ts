import { expect, test } from '@playwright/test';
import { startProduct, type Product } from '../support/server';

/** Every test of the file begins on the page of parts of a product of its own. */
export function onStylePage(): { readonly url: string } {
	let product: Product;
	test.beforeAll(async () => {
		test.setTimeout(180_000);
		product = await startProduct({ env: { PUBLIC_STYLE_PAGE: '1', RATE_LIMIT_SCALE: '100' } });
	});
	test.afterAll(() => product?.stop());
	test.beforeEach(async ({ page }) => {
		await page.goto(`${product.url}/style`);
		// The days on offer are drawn once script is there to hear a press.
		await expect(page.getByRole('button', { name: 'Mon 29 Dec' })).toBeVisible();
	});
	return {
		get url() {
			return `${product.url}/style`;
		}
	};
}
