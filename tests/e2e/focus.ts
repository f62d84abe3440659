import type { Page } from '@playwright/test';

/**
 * Goes once through the page with the tabulator key and says where the focus cannot be seen: something that stays in
 * view lies over it, it is out of the screen, or nothing marks it. Looked at in the page itself before each further
 * press, so that a hundred presses cost no more than their drawing. It begins with nothing focused: what was focused
 * before a window became wider may lie anywhere since, and no key has led there.
 */
export async function lostFocus(page: Page): Promise<string[]> {
	await page.evaluate(() => document.activeElement instanceof HTMLElement && document.activeElement.blur());
	const { stops } = await page.evaluate(watchFocus, 'later' as const);
	await Promise.all(Array.from({ length: stops + 3 }, () => page.keyboard.press('Tab')));
	return page.evaluate(() => {
		const { faults, reached, missed, end } = (window as unknown as { focusWatch: FocusWatch }).focusWatch;
		end();
		return reached.size === 0 ? ['nothing takes the focus'] : [...new Set([...faults, ...missed()])];
	});
}

/** The same about what has the focus now; it is on nothing where a deed has taken its own button away. */
export async function lostNow(page: Page): Promise<string[]> {
	const { faults, reached } = await page.evaluate(watchFocus, 'now' as const);
	return reached === 0 ? ['nothing takes the focus'] : faults;
}

interface FocusWatch {
	faults: string[];
	reached: Set<Element>;
	/** What the key should have come to and has not. */
	missed: () => string[];
	end: () => void;
}

/**
 * Runs in the page.
 * @param when looks at what has the focus now, or `later` at each further press of a key
 * @returns how often the key has to be pressed at most, and what was found now
 */
function watchFocus(when: 'now' | 'later') {
	const all = 'a[href], button, input:not([type=hidden]), select, textarea, summary, [tabindex="0"]';
	const stops = [...document.querySelectorAll<HTMLElement>(all)].filter(
		(each) => each.tabIndex >= 0 && !each.matches(':disabled') && each.checkVisibility()
	);
	const floating = [...document.querySelectorAll<HTMLElement>('body *')].filter((each) =>
		/sticky|fixed/.test(getComputedStyle(each).position)
	);
	const nameOf = (each: Element) =>
		(
			each.getAttribute('aria-label') ??
			(each.textContent.trim() || each.getAttribute('name') || each.outerHTML)
		)
			.replaceAll(/\s+/g, ' ')
			.slice(0, 50);
	const marked = (each: Element) => {
		const { outlineStyle, outlineWidth } = getComputedStyle(each);
		return outlineStyle !== 'none' && parseFloat(outlineWidth) >= 2;
	};
	/**
	 * The ring may be around the label that the control covers, or be a part of the drawing that is focused. Words that
	 * were led to, to be read on from, are no control and need none.
	 */
	const hasMark = (each: Element) =>
		each.matches('[tabindex="-1"]') ||
		[each, each.closest('label') ?? each].some(marked) ||
		[...each.querySelectorAll('.halo')].some((halo) => getComputedStyle(halo).stroke !== 'none');
	/** What lies over that box: its part on the screen, and what stays in view in front of it. */
	const coverOf = (each: Element, box: DOMRect): string | null => {
		const tall = box.height > innerHeight / 2;
		if (box.bottom <= 0 || box.top >= innerHeight || box.right <= 0 || box.left >= innerWidth) {
			return 'is out of the screen';
		}
		if (!tall && (box.top < -1 || box.bottom > innerHeight + 1)) {
			return 'is cut by the edge of the screen';
		}
		const over = floating.find((bar) => {
			const other = bar.getBoundingClientRect();
			const [left, right] = [Math.max(box.left, other.left), Math.min(box.right, other.right)];
			const [top, bottom] = [Math.max(box.top, other.top), Math.min(box.bottom, other.bottom)];
			const meets = right - left > 2 && bottom - top > 2;
			const part = tall ? bottom - top >= Math.min(box.bottom, innerHeight) - Math.max(box.top, 0) - 2 : true;
			const inFront = () => bar.contains(document.elementFromPoint((left + right) / 2, (top + bottom) / 2));
			return meets && part && !bar.contains(each) && !each.contains(bar) && inFront();
		});
		return over ? `is under ${over.localName} ${nameOf(over)}` : null;
	};
	const isReached = (each: HTMLElement) =>
		watch.reached.has(each) ||
		(each instanceof HTMLInputElement &&
			each.type === 'radio' &&
			[...watch.reached].some((one) => one instanceof HTMLInputElement && one.name === each.name));
	const watch: FocusWatch = {
		faults: [],
		reached: new Set(),
		// Of a group of radio buttons the key comes to one.
		missed: () =>
			stops
				.filter((each) => each.checkVisibility() && !isReached(each))
				.map((each) => `${nameOf(each)} is not reached`),
		end: () => removeEventListener('keydown', look, true)
	};
	function look() {
		const each = document.activeElement;
		if (!each || each === document.body || watch.reached.has(each)) {
			return;
		}
		watch.reached.add(each);
		const cover = coverOf(each, each.getBoundingClientRect());
		const faults = [cover, hasMark(each) ? null : 'has no mark of the focus'];
		watch.faults.push(...faults.flatMap((fault) => (fault ? [`${nameOf(each)} ${fault}`] : [])));
	}
	if (when === 'now') {
		look();
	} else {
		Object.assign(window, { focusWatch: watch });
		addEventListener('keydown', look, true);
	}
	return { stops: stops.length, faults: watch.faults, reached: watch.reached.size };
}
