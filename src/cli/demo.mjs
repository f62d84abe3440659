import { ensureBuilt } from './lib/build.mjs';
import { spawnServer } from './lib/children.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { launch } from './lib/launcher.mjs';
import { loadDotEnv, settingsOf } from './lib/settings.mjs';
import { tellDemonstration } from './lib/welcome.mjs';

/** `npm run demo`: from a fresh clone to the demonstration hospital, skipping what is done already. */
loadDotEnv();
const settings = settingsOf(process.env, { demo: true });
if ((await ensureInstalled()) && (await ensureBuilt())) {
	await launch({
		settings,
		demo: true,
		reuse: false,
		spawn: spawnServer,
		onReady: tellDemonstration
	});
} else {
	process.exitCode = 1;
}
