import type { Page } from '@playwright/test';
import { faultsOf } from './accessible';
import type { VisitedPage } from './every-page';
import { lostFocus } from './focus';
import { lostInForcedColours } from './forced-colours';
import { moving } from './motion';
import { PHONE } from './people';
import { enlarge, spoilt } from './room';
import { FINGER, POINTER, smallTargets } from './targets';

const NARROW = { width: 320, height: 568 };
/** A small desk, or a tablet that lies on its side. */
export const WIDE = { width: 1280, height: 800 };

/** Pages of hands that are full, wet or in a hurry: every control on them is as large as a finger. */
const FOR_FINGERS = [
	'/bedside/[episodeId]',
	'/t/[token]',
	'/p/[token]',
	'/loose-ends',
	'/ward',
	'/escalations/[id]',
	'/patients/[id]/escalate',
	'/patients/[id]/clearances',
	'/patients/[id]/clearances/[clearanceId]'
];

/** The page that everybody comes to first: by night it is looked at whole, not for its colours alone. */
export const HOME = '/loose-ends';

/** What keeps somebody from reading or working the page that is open on a phone; it stands as before afterwards. */
export async function barriers(page: Page, { page: name }: VisitedPage): Promise<string[]> {
	const found = await byDayAndNight(page, name);
	const note = noteIn(found);
	note('too small', await smallTargets(page, FOR_FINGERS.includes(name) ? FINGER : POINTER));
	note('moves', await moving(page));
	note('out of sight', await placeOutOfSight(page));
	note('on a phone', await lostFocus(page));
	await page.setViewportSize(NARROW);
	note('at 320 px', await spoilt(page));
	await page.setViewportSize(WIDE);
	note('at a desk', await lostFocus(page));
	await enlarge(page, true);
	note('at a desk, twice as large', await spoilt(page));
	await page.setViewportSize(PHONE);
	note('on a phone, twice as large', await spoilt(page));
	await enlarge(page, false);
	return found;
}

/** The same of the page as it is drawn at a desk, where tables and both bars are. */
export async function barriersAtDesk(page: Page, { page: name }: VisitedPage): Promise<string[]> {
	const found = await byDayAndNight(page, name);
	noteIn(found)('too small', await smallTargets(page, POINTER));
	return found;
}

/** The place that one is in, where a list of places that is wider than the phone does not show it. */
function placeOutOfSight(page: Page): Promise<string[]> {
	return page.locator('[aria-current=page]').evaluateAll((places) =>
		places
			.filter((each) => {
				const { left, right } = each.getBoundingClientRect();
				return each.checkVisibility() && (left < 0 || right > innerWidth);
			})
			.map((each) => each.textContent.trim())
	);
}

async function byDayAndNight(page: Page, name: string): Promise<string[]> {
	const found: string[] = [];
	const note = noteIn(found);
	const folded = await unrolled(page);
	await page.emulateMedia({ colorScheme: 'light' });
	note('by day', await faultsOf(page));
	await page.emulateMedia({ colorScheme: 'dark' });
	note('by night', await faultsOf(page, 'html', name === HOME ? undefined : ['color-contrast']));
	await page.emulateMedia({ colorScheme: null, forcedColors: 'active' });
	note('in forced colours', await lostInForcedColours(page));
	await page.emulateMedia({ forcedColors: null });
	await folded();
	return found;
}

/**
 * A window as high as the page: what stays in view at an edge then lies over nothing, where it would else be held
 * against whichever control happens to have half scrolled under it. Answers what takes it back.
 */
async function unrolled(page: Page): Promise<() => Promise<void>> {
	const before = page.viewportSize() ?? PHONE;
	const height = await page.evaluate(() => document.documentElement.scrollHeight);
	await page.setViewportSize({ ...before, height: Math.max(before.height, height) });
	return () => page.setViewportSize(before);
}

function noteIn(found: string[]) {
	return (where: string, faults: readonly unknown[]) =>
		found.push(...faults.map((fault) => `${where}: ${String(fault)}`));
}
