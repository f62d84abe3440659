import { expect, test } from '@playwright/test';
import { SIGN_INS } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { HOME } from './access';
import { everyPage, type VisitedPage } from './every-page';
import { DESK, PHONE } from './people';
import { spoilt, stretch } from './room';
import { faultsIn, look, pageOf, wordsFor, type Faults } from './walk';

/** Fewest pages that each role is let into; a role that is let into none would test nothing. */
const LEAST = 8;

let product: Product;
let visited: VisitedPage[];
/** The pages of the product behind the sign-in, and all others with that of the parts. */
let inside: VisitedPage[];
let open: VisitedPage[];

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000', PUBLIC_STYLE_PAGE: '1' } });
	visited = await everyPage(product);
	inside = visited.filter(({ group }) => group === 'app');
	open = visited.filter(({ group }) => group !== 'app');
});
test.afterAll(() => product?.stop());

/** What the roles before were shown: a page but home that says the same to a second role is not looked at again. */
const shown = new Set<string>();

for (const role of Object.keys(SIGN_INS) as (keyof typeof SIGN_INS)[]) {
	test(`on a phone every page of a ${role} keeps still, and has room for words longer by two fifths`, async ({
		browser
	}) => {
		test.setTimeout(300_000);
		const page = await pageOf(browser, product.url, role, PHONE);
		const faults: Faults = {};
		let letIn = 0;
		for (const one of inside) {
			const said = await wordsFor(page, one.address);
			letIn += said === null ? 0 : 1;
			if (said !== null && (one.page === HOME || !shown.has(said))) {
				shown.add(said);
				faults[one.page] = await look(page, one);
			}
		}
		expect(letIn).toBeGreaterThanOrEqual(LEAST);
		expect(faultsIn(faults)).toEqual([]);
		await page.context().close();
	});
}

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`every page that opens without a sign-in keeps still, is light, and has room: ${size}`, async ({
		browser
	}) => {
		test.setTimeout(180_000);
		const page = await pageOf(browser, product.url, null, viewport);
		const faults: Faults = {};
		for (const one of open) {
			expect(one.posted ?? (await wordsFor(page, one.address)), one.page).not.toBeNull();
			faults[one.page] = await look(page, one);
		}
		expect(faultsIn(faults)).toEqual([]);
		await page.context().close();
	});
}

test('at a desk every page behind the sign-in is visited, keeps still, is light, and has room', async ({
	browser
}) => {
	test.setTimeout(300_000);
	const faults: Faults = {};
	for (const role of ['therapist', 'coordinator', 'admin', 'surgeon', 'nurse'] as const) {
		const page = await pageOf(browser, product.url, role, DESK);
		for (const one of inside.filter(({ page: name }) => !(name in faults))) {
			if ((await wordsFor(page, one.address)) !== null) {
				faults[one.page] = await look(page, one);
			}
		}
		await page.context().close();
	}
	expect(Object.keys(faults).toSorted()).toEqual(inside.map(({ page }) => page).toSorted());
	expect(faultsIn(faults)).toEqual([]);
});

for (const opener of [null, 'Open a dialog', 'Open a sheet']) {
	test(`the parts have room for longer words: ${opener ?? 'all of them'}`, async ({ browser }) => {
		for (const viewport of [PHONE, DESK]) {
			const page = await pageOf(browser, product.url, null, viewport);
			await page.goto('/style');
			await expect(page.getByRole('button', { name: 'Mon 29 Dec' })).toBeVisible();
			if (opener) {
				await page.getByRole('button', { name: opener }).press('Enter');
				await expect(page.getByRole('dialog')).toBeVisible();
			}
			await stretch(page);
			expect(await spoilt(page)).toEqual([]);
			await page.context().close();
		}
	});
}

test('what is cut, covered or too wide is found', async ({ page }) => {
	await page.setViewportSize(PHONE);
	const found = async (main: string) => {
		await page.setContent(`<main>${main}</main>`);
		return (await spoilt(page)).map((each) => each.split(':')[0]);
	};
	expect(await found('<button>Take it</button><p>Words that have room</p>')).toEqual([]);
	expect(
		await found('<p style="width: 40px; overflow: hidden; white-space: nowrap">Far too long</p>')
	).toEqual(['cut']);
	expect(
		await found('<a href="#a">Take it</a><a href="#b" style="margin-left: -40px">Pass it on</a>')
	).toEqual(['over each other']);
	expect(await found('<p style="width: 500px">Wider than a phone</p>')).toContain('the page is 508 px wide');
});
