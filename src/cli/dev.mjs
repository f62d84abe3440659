import { spawnFollower } from './lib/children.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { launch } from './lib/launcher.mjs';
import { at } from './lib/paths.mjs';
import { loadDotEnv, settingsOf } from './lib/settings.mjs';
import { tellDemonstration } from './lib/welcome.mjs';

/** `npm run dev`: the development server in demonstration mode, with the stand-ins unless they listen already. */
loadDotEnv();
const settings = settingsOf(process.env, { demo: true });
const viteArgs = ['dev', '--host', settings.host, '--port', String(settings.port), '--strictPort'];
if (await ensureInstalled()) {
	await launch({
		settings,
		demo: true,
		reuse: true,
		spawn: (env) => spawnFollower([at('node_modules', 'vite', 'bin', 'vite.js'), ...viteArgs], env),
		onReady: tellDemonstration
	});
} else {
	process.exitCode = 1;
}
