import { expect, test } from '@playwright/test';
import { admit, signInAs, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { DESK, expectConnected, seat, signIn } from './people';

const PATIENTS = 60;

let product: Product;
let surgeon: Client;
let episodeId: string;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	// Its clock stands still: a minute that passes changes words on every row, and rightly so.
	const env = { RATE_LIMIT_SCALE: '1000', TEST_CLOCK_AT: new Date().toISOString() };
	product = await startProduct({ env });
	const coordinator = await signInAs(product.url, 'coordinator');
	surgeon = await signInAs(product.url, 'surgeon');
	const { items } = (await surgeon.get('/api/episodes?limit=100')).body;
	for (let count = items.length; count < PATIENTS; count += 1) {
		episodeId = await admit(coordinator, { level: 1 + (count % 6) });
	}
});
test.afterAll(() => product?.stop());

test('on a ward of sixty one patient changes live, and nothing of another row is drawn anew', async ({
	browser
}) => {
	const { page, context, complaints } = await seat(browser, product.url, null, DESK);
	await context.clock.setFixedTime(Date.now());
	await signIn(page, 'therapist');
	await page.goto('/ward');
	await expectConnected(page);
	const rows = page.locator('tbody tr');
	await expect(rows).toHaveCount(PATIENTS);
	await page.evaluate(watchRows);
	const referral = { service: 'physiotherapy', priority: 'soon', question: 'Please begin.' };
	await surgeon.post(`/api/episodes/${episodeId}/referrals`, referral);
	const changed = page.getByRole('row').filter({ has: page.locator(`a[href="/patients/${episodeId}"]`) });
	await expect(changed).toContainText('physiotherapy asked');
	const touched = await page.evaluate(() => [...(window as unknown as { touched: Set<string> }).touched]);
	expect(touched).toEqual([`/patients/${episodeId}`]);
	expect(complaints).toEqual([]);
	await context.close();
});

/** Runs in the page: whatever is put there, taken away, reworded or dressed otherwise, by the patient of its row. */
function watchRows(): void {
	const touched = new Set<string>();
	const nameOf = (node: Node | null) =>
		(node instanceof Element ? node : node?.parentElement)
			?.closest('tr')
			?.querySelector('a')
			?.getAttribute('href');
	new MutationObserver((changes) =>
		changes.forEach(({ target, addedNodes, removedNodes }) => {
			const lost = [...addedNodes, ...removedNodes].some((node) => node.nodeName === 'TR');
			touched.add(lost ? 'a row came or went' : (nameOf(target) ?? 'the table'));
		})
	).observe(document.querySelector('table') ?? document, {
		subtree: true,
		childList: true,
		attributes: true,
		characterData: true
	});
	Object.assign(window, { touched });
}
