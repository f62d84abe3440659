import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import type { Route } from '../common/http';

const require = createRequire(import.meta.url);

const HEADERS = {
	'Cache-Control': 'no-cache',
	'Content-Security-Policy':
		"default-src 'none'; script-src 'self'; style-src 'self'; font-src 'self'; connect-src 'self'; " +
		"img-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'",
	'Referrer-Policy': 'no-referrer',
	'X-Content-Type-Options': 'nosniff'
};

/** The page of phones and mailbox, with its script, style, drawing and fonts. */
export function pageRoutes(): Route[] {
	return [
		file(/^\/$/, 'text/html; charset=utf-8', ownFile('index.html')),
		file(/^\/page\.css$/, 'text/css; charset=utf-8', ownFile('page.css')),
		...['page.js', 'phones.js', 'notices.js', 'mailbox.js', 'elements.js', 'rope.js'].map((name) =>
			file(new RegExp(`^/${name.replace('.', '\\.')}$`), 'text/javascript; charset=utf-8', ownFile(name))
		),
		file(/^\/favicon\.svg$/, 'image/svg+xml', ownFile('favicon.svg')),
		...['400', '700', '900'].map((weight) =>
			file(
				new RegExp(`^/lato-${weight}\\.woff2$`),
				'font/woff2',
				require.resolve(`@fontsource/lato/files/lato-latin-${weight}-normal.woff2`)
			)
		)
	];
}

function ownFile(name: string): string {
	return fileURLToPath(new URL(`../page/${name}`, import.meta.url));
}

function file(path: RegExp, type: string, source: string): Route {
	return [
		'GET',
		path,
		async ({ response }) => {
			const content = await readFile(source);
			response.writeHead(200, { ...HEADERS, 'Content-Type': type }).end(content);
		}
	];
}
