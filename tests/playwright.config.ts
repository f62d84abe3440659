import { defineConfig } from '@playwright/test';
import { CHROMIUM, shellOrChromium } from '../src/cli/lib/chromium.mjs';

/** Where `npm test` reads the counts from; without it only the list is printed. */
const report = process.env.JOURNEYS_REPORT;

/** People's whole ways through the product; they run in the browser that people have, the rest in its shell. */
const JOURNEYS = /(main-job|call-for-help|keyboard|notices)\.spec/;

const ARGS = [
	'--no-sandbox',
	'--disable-gpu',
	'--disable-quic',
	'--no-first-run',
	'--disable-background-networking',
	'--disable-component-update',
	'--disable-sync'
];

/** @param executablePath which build of Debian's Chromium */
function browser(executablePath: string) {
	return { launchOptions: { executablePath, args: ARGS } };
}

/**
 * Journeys in Debian's Chromium. No server is started here: each journey starts its own product on free ports with
 * `startProduct` of tests/support/server.ts, so that journeys share nothing and may kill what they started.
 */
export default defineConfig({
	testDir: process.env.SCREENSHOTS ? 'screenshots' : 'e2e',
	outputDir: '../test-results',
	workers: 2,
	retries: 0,
	timeout: 60_000,
	forbidOnly: true,
	expect: { timeout: 10_000 },
	reporter: report ? [['list'], ['json', { outputFile: report }]] : [['list']],
	use: {
		browserName: 'chromium',
		trace: 'off',
		screenshot: 'off',
		video: 'off',
		locale: 'en-IE',
		timezoneId: 'Europe/Dublin'
	},
	projects: [
		{ name: 'journeys', testMatch: JOURNEYS, use: browser(CHROMIUM) },
		{ name: 'pages', testIgnore: JOURNEYS, use: browser(shellOrChromium()) }
	]
});
