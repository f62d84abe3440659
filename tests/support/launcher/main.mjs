import { fileURLToPath } from 'node:url';
import { spawnFollower } from '../../../src/cli/lib/children.mjs';
import { launch } from '../../../src/cli/lib/launcher.mjs';
import { settingsOf } from '../../../src/cli/lib/settings.mjs';

/** A launcher as `npm run demo` is, with a stand-in for the application; `REUSE=1` as `npm start` is. */
const standIn = fileURLToPath(new URL('./stand-in.mjs', import.meta.url));
await launch({
	settings: settingsOf(process.env, { demo: true }),
	demo: true,
	reuse: process.env.REUSE === '1',
	spawn: (env) => spawnFollower([standIn], env),
	onReady: () => console.log('all is ready')
});
