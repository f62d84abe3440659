import type { Page } from '@playwright/test';

/** How long anything may move for who asks for stillness, seconds: shorter than one picture of a screen. */
const STILL = 0.01;

/** What moves or scrolls for longer on the page as it stands. */
export function moving(page: Page): Promise<string[]> {
	return page.evaluate((still) => {
		const longest = (durations: string) => Math.max(...durations.split(',').map((each) => parseFloat(each)));
		const moves = (each: Element) =>
			[null, '::before', '::after', '::backdrop'].some((part) => {
				const { transitionDuration, animationDuration, scrollBehavior } = getComputedStyle(each, part);
				return (
					longest(transitionDuration) > still ||
					longest(animationDuration) > still ||
					scrollBehavior === 'smooth'
				);
			});
		const drawn = document
			.getAnimations()
			.filter(({ effect }) => Number(effect?.getComputedTiming().activeDuration) > still * 1000);
		return [
			...[...document.querySelectorAll('*')]
				.filter(moves)
				.map((each) => `${each.localName}.${each.className}`),
			...drawn.map(({ id }) => `an animation ${id}`),
			...[...document.querySelectorAll('animate, animateTransform, animateMotion, marquee')].map(
				(each) => each.localName
			)
		];
	}, STILL);
}
