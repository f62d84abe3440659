import { test, type Page } from '@playwright/test';
import { startProduct, type Product } from '../support/server';
import { AT, lookAs, settled, SIZES, type Theme, type Who } from './camera';
import { setScene, type Scene } from './scene';
import { keepAsWebp } from './webp';

/** The pictures of README and guides, in the window of a desk; on a phone as they are. */
const DESK = { width: 1440, height: 900 };
const FOLDER = 'docs/pictures';
/** The pictures of the front page, by day and by night. */
const FRONT = 'static/pictures';

let product: Product;
let scene: Scene;

test.beforeAll(async () => {
	test.setTimeout(240_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000', TEST_CLOCK_AT: AT } });
	scene = await setScene(product);
});
test.afterAll(() => product?.stop());

interface Kept {
	name: string;
	who: Who | null;
	at: () => string;
	phone?: boolean;
	theme?: Theme;
	/** Whether the front page shows it too. */
	front?: boolean;
	/** What is done on the page before the picture is taken. */
	first?: (page: Page) => Promise<void>;
}

const KEPT: Kept[] = [
	{ name: 'front', who: null, at: () => '/' },
	{ name: 'ward', who: 'therapist', at: () => '/ward' },
	{ name: 'thread', who: 'therapist', at: () => scene.thread },
	{ name: 'surgeon', who: 'surgeon', at: () => '/loose-ends' },
	{ name: 'physician', who: 'physician', at: () => '/loose-ends' },
	{ name: 'speech-therapist', who: 'speech-therapist', at: () => '/loose-ends' },
	{ name: 'coordinator', who: 'coordinator', at: () => '/visits' },
	{ name: 'admin', who: 'admin', at: () => '/admin/accounts' },
	{ name: 'nurse', who: 'nurse', at: () => '/ward', phone: true },
	{ name: 'decide', who: 'surgeon', at: () => scene.ask, phone: true, front: true },
	{ name: 'bedside', who: 'therapist', at: () => scene.bedside, phone: true, front: true, first: fall },
	{ name: 'call', who: null, at: () => scene.call, phone: true, theme: 'night', front: true },
	{ name: 'patient', who: null, at: () => scene.own, phone: true }
];

for (const kept of KEPT) {
	test(`kept: ${kept.name}`, async ({ browser }) => {
		for (const theme of kept.front ? (['day', 'night'] as const) : [kept.theme ?? 'day']) {
			const page = await lookAs(browser, product.url, kept.who, theme);
			await page.setViewportSize(kept.phone ? SIZES['390'] : DESK);
			await page.goto(kept.at(), { waitUntil: 'load' });
			await settled(page, kept.who);
			await kept.first?.(page);
			const picture = await page.screenshot({
				animations: 'disabled',
				...(theme === (kept.theme ?? 'day') && { path: `${FOLDER}/${kept.name}.png` })
			});
			if (kept.front) {
				await keepAsWebp(page, picture, `${FRONT}/${kept.name}-${theme}.webp`);
			}
			await page.context().close();
		}
	});
}

/** A pressure that falls too far, as it is typed. */
async function fall(page: Page): Promise<void> {
	const type = (name: string, value: string) =>
		page.getByRole('textbox', { name: new RegExp(`^${name}`) }).fill(value);
	await type('Systolic', '128');
	await type('Diastolic', '74');
	await type('Pulse', '76');
	await page.getByRole('tab', { name: /After/ }).click();
	await type('Systolic', '108');
	await page.getByText('Stop. Sit the patient down.').first().waitFor();
	// Below the bars, which keep their room: the figure, what it fell from, and the rule.
	await page
		.getByRole('textbox', { name: /^Systolic/ })
		.evaluate((field) => field.scrollIntoView({ block: 'start' }));
}
