/**
 * Day, night, or as the device says. The choice is kept on the device; `app.html` reads the same key before
 * anything is painted, so that no page flashes white at night.
 */
export const THEME_CHOICES = ['day', 'night', 'device'] as const;
export type ThemeChoice = (typeof THEME_CHOICES)[number];

const KEY = 'theme';

/** What was chosen on this device; `device` when nothing was, or when storage is closed to us. */
export function storedTheme(): ThemeChoice {
	try {
		const stored = localStorage.getItem(KEY);
		return stored === 'day' || stored === 'night' ? stored : 'device';
	} catch {
		return 'device';
	}
}

/** Show the page in the chosen theme and remember it for the next one. */
export function chooseTheme(choice: ThemeChoice): void {
	const root = document.documentElement;
	root.style.removeProperty('color-scheme');
	if (choice === 'device') {
		delete root.dataset.theme;
	} else {
		root.dataset.theme = choice;
	}
	colourTheBar(choice);
	try {
		localStorage.setItem(KEY, choice);
	} catch {
		// The page still shows the choice; only the next one will not know it.
	}
}

/** The browser's own bar follows the device; a theme that was chosen rules it too, so that none stays bright by night. */
function colourTheBar(choice: ThemeChoice): void {
	for (const bar of document.querySelectorAll<HTMLMetaElement>('meta[name="theme-color"]')) {
		bar.dataset.device ??= bar.media;
		bar.media = choice === 'device' ? bar.dataset.device : bar.dataset.of === choice ? 'all' : 'not all';
	}
}
