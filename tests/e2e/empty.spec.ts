import { expect, test } from '@playwright/test';
import { startProduct, type Product } from '../support/server';
import { emptyUnit } from './empty-unit';
import { PHONE } from './people';
import { faultsIn, look, pageOf, wordsFor, type Faults } from './walk';

const ROLES = ['surgeon', 'physician', 'nurse', 'therapist', 'speech-therapist', 'coordinator'] as const;
/** Pages that list something, each of which is empty in a new unit. */
const LISTS = ['/loose-ends', '/ward', '/visits', '/cover', '/rules'];

let product: Product;
let people: Awaited<ReturnType<typeof emptyUnit>>;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	people = await emptyUnit(product, ROLES);
});
test.afterAll(() => product?.stop());

const shown = new Set<string>();

for (const role of ROLES) {
	test(`in a unit where nobody lies yet a ${role} can read every list and is told what comes next`, async ({
		browser
	}) => {
		const page = await pageOf(browser, product.url, people[role] ?? null, PHONE);
		const faults: Faults = {};
		for (const address of LISTS) {
			const said = await wordsFor(page, address);
			if (said !== null && !shown.has(said)) {
				shown.add(said);
				faults[address] = await look(page, { page: address, address, group: 'app' });
			}
		}
		expect(faultsIn(faults)).toEqual([]);
		await page.goto('/loose-ends');
		await expect(page.getByRole('main')).toContainText('Nothing waits on you');
		await page.goto('/ward');
		await expect(page.getByRole('main')).toContainText('Nobody lies here');
		await page.context().close();
	});
}
