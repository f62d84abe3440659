import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';

const ROUTES = path.resolve('src/routes');

const METHODS = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE'] as const;

/** Every handler of a `+server.ts`, as `POST /api/episodes/[id]/visits`, read from the route files themselves. */
export function handlers(): string[] {
	return servers().flatMap(({ address, methods }) => methods.map((method) => `${method} ${address}`));
}

/** Those of the API alone. */
export function apiHandlers(): string[] {
	return handlers().filter((handler) => handler.includes(' /api/'));
}

/** Every method that a `+server.ts` does not export, written as its handlers are. */
export function noHandlers(): string[] {
	return servers().flatMap(({ address, methods }) =>
		METHODS.filter((method) => !methods.includes(method)).map((method) => `${method} ${address}`)
	);
}

function servers(): { address: string; methods: string[] }[] {
	return files('+server.ts').map((file) => {
		const text = readFileSync(path.join(ROUTES, file), 'utf8');
		const exported = text.matchAll(/export (?:const|function|async function) (GET|POST|PUT|PATCH|DELETE)\b/g);
		return { address: addressOf(file), methods: [...exported].map((match) => match[1] ?? '') };
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

/** Every form action of a page behind the sign-in, as `/patients/[id]/threads/[threadId]?/post`; a page's only one has no name. */
export function formActions(): string[] {
	return actionsOf((file) => file.startsWith('(app)'));
}

/** Every form action of a page that needs no sign-in, written the same way; the page that shows styles left out. */
export function openFormActions(): string[] {
	return actionsOf((file) => /^\((public|phone|patient)\)/.test(file));
}

function actionsOf(among: (file: string) => boolean): string[] {
	return files('+page.server.ts')
		.filter(among)
		.flatMap((file) => {
			const text = readFileSync(path.join(ROUTES, file), 'utf8');
			const names = actionNames(ts.createSourceFile(file, text, ts.ScriptTarget.Latest));
			return names.map((name) => addressOf(file) + (name === 'default' ? '' : `?/${name}`));
		});
}

function actionNames(source: ts.SourceFile): string[] {
	const names: string[] = [];
	source.forEachChild((node) => {
		const declared = ts.isVariableStatement(node) ? node.declarationList.declarations : [];
		for (const { name, initializer } of declared) {
			if (name.getText(source) === 'actions' && initializer && ts.isObjectLiteralExpression(initializer)) {
				names.push(...initializer.properties.map((property) => property.name?.getText(source) ?? ''));
			}
		}
	});
	return names;
}
