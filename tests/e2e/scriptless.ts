import type { Page } from '@playwright/test';

/** Open whatever a reader can open by the browser alone: folds, and the panel of more places. */
export async function unfoldAll(page: Page): Promise<void> {
	await page.evaluate(() => {
		document.querySelectorAll('details').forEach((fold) => (fold.open = true));
		for (const panel of document.querySelectorAll<HTMLElement>('[popover]')) {
			// Of the browser's own kind only one would stay open.
			panel.popover = 'manual';
			panel.showPopover();
		}
	});
}

/**
 * What a page without script only pretends to: controls that nothing answers, words that say it is still coming, boxes
 * with nothing in them. What is disabled says so itself, and pretends nothing.
 */
export async function pretences(page: Page): Promise<string[]> {
	return page.evaluate(() => {
		const found: string[] = [];
		const note = (what: string, all: Element[]) =>
			found.push(...all.map((each) => `${what}: ${named(each)}`));
		function named(each: Element): string {
			const words = (each.getAttribute('aria-label') ?? each.textContent ?? '')
				.trim()
				.replaceAll(/\s+/g, ' ');
			return `${each.localName} ${words || each.getAttribute('name') || each.className}`.slice(0, 70);
		}
		const seen = (each: Element) =>
			each.checkVisibility({ visibilityProperty: true, opacityProperty: true }) && !each.closest('[inert]');
		const all = <T extends Element>(selector: string) =>
			[...document.body.querySelectorAll<T>(selector)].filter(seen);
		const works = <T extends Element>(selector: string) =>
			all<T>(selector).filter((each) => !each.matches(':disabled'));
		/** By the attribute, because a field called method would stand for the form's own; `dialog` sends nothing. */
		const isSent = (form: HTMLFormElement | null) =>
			form !== null && /^(post|get)$/i.test(form.getAttribute('method') ?? '');
		const submits = (each: Element) => each.matches('button:not([type]), [type=submit]');

		note(
			'nothing answers',
			works<HTMLButtonElement>('button').filter(
				(each) => !(submits(each) && isSent(each.form)) && each.popoverTargetElement === null
			)
		);
		note(
			'is never sent',
			works<HTMLInputElement>('input, select, textarea').filter((each) => !isSent(each.form) || !each.name)
		);
		note(
			'cannot be sent',
			all<HTMLFormElement>('form').filter((form) => {
				const open = [...form.elements].filter((each) => seen(each) && !each.matches(':disabled'));
				return open.length > 0 && !open.some(submits);
			})
		);
		note(
			'leads nowhere',
			all<HTMLAnchorElement>('a').filter(({ hash, href }) => {
				const within = href.split('#')[0] === location.href.split('#')[0] && hash !== '';
				return href === '' || (within && document.getElementById(hash.slice(1)) === null);
			})
		);
		note(
			'is no control of the browser',
			works('[role=button], [role=tab], [role=switch], [role=combobox], [role=slider], [role=menu]')
		);
		note('still waits', all('progress, [role=progressbar], [aria-busy=true]'));
		note(
			'still waits',
			all('[role=status]').filter((each) => /^\s*(Loading|Sending|Please wait)/.test(each.textContent ?? ''))
		);
		note(
			'is an empty box',
			all<HTMLElement>('main :empty:not(input, textarea, select, img, hr, br, td, th, svg *)').filter(
				(each) => each.offsetWidth > 40 && each.offsetHeight > 40
			)
		);
		return found;
	});
}
