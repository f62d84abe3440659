import { defineConfig } from '@playwright/test';

/** Where `npm test` reads the counts from; without it only the list is printed. */
const report = process.env.JOURNEYS_REPORT;

/**
 * Journeys in Debian's Chromium. No server is started here: each journey starts its own product on free ports with
 * `startProduct` of tests/support/server.ts, so that journeys share nothing and may kill what they started.
 */
export default defineConfig({
	testDir: 'e2e',
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
		timezoneId: 'Europe/Dublin',
		launchOptions: {
			executablePath: process.env.CHROMIUM_PATH || '/usr/bin/chromium',
			args: [
				'--no-sandbox',
				'--disable-gpu',
				'--disable-quic',
				'--no-first-run',
				'--disable-background-networking',
				'--disable-component-update',
				'--disable-sync'
			]
		}
	}
});
