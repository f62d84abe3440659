import { weighBuild } from './lib/weigh.mjs';

/** The last step of `npm run build`: says the heaviest pages, and fails where one is above what it may weigh. */
const weights = weighBuild().toSorted((a, b) => a.most - a.kib - (b.most - b.kib));
const line = (/** @type {import('./lib/weigh.mjs').Weight} */ { page, kib, most }) =>
	`${page}: ${kib.toFixed(1)} of ${most} KiB of script`;
console.log(['Heaviest pages', ...weights.slice(0, 5).map(line)].join('\n  '));
const over = weights.filter(({ kib, most }) => kib > most);
if (over.length > 0) {
	console.error(['Too heavy', ...over.map(line)].join('\n  '));
	process.exitCode = 1;
}
