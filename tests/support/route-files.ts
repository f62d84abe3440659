import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';

const ROUTES = path.resolve('src/routes');

/** Every handler of the API, as `POST /api/episodes/[id]/visits`, read from the route files themselves. */
export function apiHandlers(): string[] {
	return files('+server.ts')
		.filter((file) => file.startsWith('api/'))
		.flatMap((file) => {
			const text = readFileSync(path.join(ROUTES, file), 'utf8');
			const methods = [
				...text.matchAll(/export (?:const|function|async function) (GET|POST|PUT|PATCH|DELETE)\b/g)
			];
			return methods.map((match) => `${match[1]} ${addressOf(file)}`);
		});
}

/** Every page, as `/patients/[id]/threads/[threadId]`, with the group it belongs to. */
export function pages(): { group: string; address: string }[] {
	return files('+page.svelte').map((file) => ({
		group: /^\((\w+)\)/.exec(file)?.[1] ?? '',
		address: addressOf(file)
	}));
}

function files(name: string): string[] {
	const all = readdirSync(ROUTES, { recursive: true, encoding: 'utf8' });
	return all.filter((file) => path.basename(file) === name).toSorted();
}

function addressOf(file: string): string {
	const parts = path.dirname(file).split(path.sep);
	return `/${parts.filter((part) => part !== '.' && !part.startsWith('(')).join('/')}`;
}
