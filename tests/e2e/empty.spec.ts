import { expect, test } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { EMPTY, emptyUnit } from './empty-unit';
import { DESK, PHONE } from './people';
import { faultsIn, look, pageOf, wordsFor, type Faults } from './walk';

const ROLES = ['surgeon', 'physician', 'nurse', 'therapist', 'speech-therapist', 'coordinator'] as const;
/** The pages of a patient about whom nothing has been asked, recorded or booked yet. */
const OF_A_PATIENT = ['', '/clearances', '/sessions', '/level', '/limits', '/visits', '/refer'];
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
		await expect(page.getByRole('main')).toContainText('it stands here at once');
		await page.getByRole('link', { name: 'To the ward' }).click();
		await expect(page.getByRole('main')).toContainText('Nobody lies here');
		await expect(page.getByRole('main')).toContainText('admitted or transferred to this unit');
		await page.context().close();
	});
}

for (const [size, viewport] of Object.entries({ phone: PHONE, desk: DESK })) {
	test(`about a patient of whom nothing is known yet every page can be read: ${size}`, async ({
		browser
	}) => {
		const { coordinator, surgeon } = people;
		if (!coordinator || !surgeon) {
			throw new Error('Nobody belongs to the new unit.');
		}
		const client = await signInAs(product.url, coordinator.email, coordinator.password);
		const episodeId = await admit(client, { unit: EMPTY, operation: undefined });
		const page = await pageOf(browser, product.url, surgeon, viewport);
		const faults: Faults = {};
		for (const below of OF_A_PATIENT) {
			const one = `/patients/[id]${below}`;
			faults[one] = await look(page, { page: one, address: `/patients/${episodeId}${below}`, group: 'app' });
		}
		expect(faultsIn(faults)).toEqual([]);
		await page.context().close();
	});
}
