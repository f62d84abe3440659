import { expect, test, type Page } from '@playwright/test';
import { startProduct, type Product } from '../support/server';
import { everyPage, open, type VisitedPage } from './every-page';
import { FACTS } from './facts';
import { spoilt } from './room';
import { pretences, unfoldAll } from './scriptless';
import { Scriptless } from './scriptless-people';

/** Script is off, or has not come: every page can be read all the same. */
/** The second address of a page that shows several things. */
const UNTOLD = '/loose-ends/visits';

let product: Product;
let visited: VisitedPage[];
let people: Scriptless;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	people = new Scriptless(product);
	visited = await everyPage(product);
});
test.afterAll(() => product?.stop());

/** What is wrong with the page that is open. */
async function faultsOf(page: Page, facts: readonly string[] = []): Promise<string[]> {
	const title = page.getByRole('heading', { level: 1 });
	const heads = (await title.allTextContents()).filter((words) => words.trim() !== '');
	const words = (await page.locator('body').innerText()).replaceAll(/\s+/g, ' ');
	const lacking = facts.filter((fact) => !words.includes(fact));
	await unfoldAll(page);
	return [
		...(heads.length === 1 ? [] : [`has ${heads.length} headings of the first level`]),
		...(facts.length === 0 ? ['no fact is known of it: give it one in tests/e2e/facts.ts'] : []),
		...lacking.map((fact) => `does not say: ${fact}`),
		...(await spoilt(page)),
		...(await pretences(page))
	];
}

test('every page can be read on a phone, and pretends nothing', async ({ browser }) => {
	const faults: Record<string, string[]> = {};
	for (const role of [null, 'therapist', 'coordinator', 'surgeon', 'admin'] as const) {
		const page = await people.phoneOf(browser, role);
		for (const one of visited) {
			const outside = one.group !== 'app';
			const left = !(one.address in faults) && outside === (role === null);
			// What a form leads to says with its status that it was not taken yet.
			if (left && ((await open(page, one))?.status() === 200 || one.posted)) {
				const untold = one.page.startsWith(UNTOLD);
				faults[one.address] = await faultsOf(page, FACTS[untold ? UNTOLD : one.page]);
			}
		}
		await page.context().close();
	}
	expect(Object.entries(faults).filter(([, what]) => what.length > 0)).toEqual([]);
	expect(Object.keys(faults).toSorted()).toEqual(visited.map(({ address }) => address).toSorted());
});

test('what only pretends is found', async ({ browser }) => {
	const page = await people.phoneOf(browser, null);
	const found = async (main: string) => {
		await page.setContent(`<main>${main}</main>`);
		return (await pretences(page)).map((each) => each.split(':')[0]);
	};
	const works = `<form method="post"><input name="method"><button>Send</button></form><a href="/ward">Ward</a>
		<details><summary>More</summary></details><button popovertarget="p">More</button><p popover id="p">Places</p>
		<button disabled>Settle</button>`;
	expect(await found(works)).toEqual([]);
	expect(await found('<button>Copy it</button>')).toEqual(['nothing answers']);
	const keptBack = '<form method="dialog"><input name="a"><button>Send</button></form>';
	expect(await found(keptBack)).toEqual(['nothing answers', 'is never sent']);
	expect(await found('<form method="post"><input><button>Send</button></form>')).toEqual(['is never sent']);
	expect(await found('<form method="post"><input name="a"></form>')).toEqual(['cannot be sent']);
	expect(await found('<a href="#gone">Down</a>')).toEqual(['leads nowhere']);
	expect(await found('<div role="tab">After</div>')).toEqual(['is no control of the browser']);
	expect(await found('<p role="status">Loading</p>')).toEqual(['still waits']);
	expect(await found('<div style="height: 80px"></div>')).toEqual(['is an empty box']);
});
