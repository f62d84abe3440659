import { defineConfig } from '@playwright/test';
import journeys from './playwright.config';

/** Makes the pictures of README and guides from the running product: `npm run pictures`. No test of `npm test`. */
export default defineConfig({ ...journeys, testDir: 'pictures', workers: 1, timeout: 180_000 });
