import { ensureBuilt, hasBuild } from './lib/build.mjs';
import { spawnServer } from './lib/children.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { launch } from './lib/launcher.mjs';
import { isDemo, loadDotEnv, settingsOf } from './lib/settings.mjs';
import { tellDemonstration } from './lib/welcome.mjs';

/**
 * `npm start`: the built application alone; with `DEMO=1` in demonstration mode, with the stand-ins unless they
 * listen already. A build that is there is used as it is.
 */
loadDotEnv();
const demo = isDemo(process.env);
const settings = settingsOf(process.env, { demo });
if (hasBuild() || ((await ensureInstalled()) && (await ensureBuilt()))) {
	await launch({
		settings,
		demo,
		reuse: true,
		spawn: spawnServer,
		onReady: demo ? tellDemonstration : ({ publicUrl }) => console.log(`Ropewalk is ready: ${publicUrl}`)
	});
} else {
	process.exitCode = 1;
}
