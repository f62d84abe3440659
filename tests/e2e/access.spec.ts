import { expect, test } from '@playwright/test';
import { lostFocus } from './focus';
import { lostInForcedColours } from './forced-colours';
import { moving } from './motion';
import { PHONE } from './people';
import { FINGER, POINTER, smallTargets } from './targets';

// Every page is measured by these; here each of them is shown to find what it looks for.

test.beforeEach(({ page }) => page.setViewportSize(PHONE));

const control = (style: string) => `<main><button style="${style}">Take it</button><p>Bed 4</p></main>`;

test('a control that is too small for a finger is found, and a link in a sentence is not', async ({
	page
}) => {
	const found = async (main: string, least: number) => {
		await page.setContent(main);
		return smallTargets(page, least);
	};
	const tall = (px: number) => control(`box-sizing: border-box; width: 90px; padding: 0; height: ${px}px`);
	expect(await found(tall(43), FINGER)).toEqual(['90 x 43 px: Take it']);
	expect(await found(tall(44), FINGER)).toEqual([]);
	expect(await found(tall(23), POINTER)).toEqual(['90 x 23 px: Take it']);
	expect(await found(tall(24), POINTER)).toEqual([]);
	expect(await found('<main><p>Read the <a href="#a">rules</a> first.</p></main>', POINTER)).toEqual([]);
	expect(await found('<main><p><a href="#a">Rules</a></p></main>', POINTER)).toHaveLength(1);
});

test('a focus that nothing marks, or that lies under what stays in view, is found', async ({ page }) => {
	const found = async (main: string) => {
		await page.setContent(main);
		return lostFocus(page);
	};
	const ring = '<style>:focus { outline: 3px solid black }</style>';
	const bar =
		'<footer style="position: fixed; inset: auto 0 0; height: 300px; background: white">Bar</footer>';
	const below = '<div style="height: 700px"></div>';
	expect(await found(ring + control(''))).toEqual([]);
	expect(await found(`<style>:focus { outline: none }</style>${control('')}`)).toEqual([
		'Take it has no mark of the focus'
	]);
	expect(await found(ring + below + control('') + bar)).toEqual(['Take it is under footer Bar']);
	expect(await found(ring + control('position: absolute; left: -500px'))).toEqual([
		'Take it is out of the screen'
	]);
	expect(await found('<main>Words alone</main>')).toEqual(['nothing takes the focus']);
});

test('what moves for who asks for stillness is found', async ({ page }) => {
	await page.setContent(control('transition: opacity 0.2s'));
	expect(await moving(page)).toHaveLength(1);
	await page.setContent(control('transition: none'));
	expect(await moving(page)).toEqual([]);
	await page.setContent('<style>html { scroll-behavior: smooth }</style>');
	expect(await moving(page)).toHaveLength(1);
});

test('a control and a drawing that forced colours take away are found', async ({ page }) => {
	await page.emulateMedia({ forcedColors: 'active' });
	const found = async (main: string) => {
		await page.setContent(main);
		return lostInForcedColours(page);
	};
	const mark = (paint: string) =>
		`<main><svg width="9" height="9"><path d="M0 0h9" stroke="${paint}" fill="none"/></svg></main>`;
	expect(await found(control('border: 0; background: teal'))).toEqual(['button Take it has no edge']);
	expect(await found(control('border: 2px solid teal'))).toEqual([]);
	expect(await found(control('border: 0; text-decoration: underline'))).toEqual([]);
	expect(await found(mark('Canvas'))).toHaveLength(1);
	expect(await found(mark('CanvasText'))).toEqual([]);
});
