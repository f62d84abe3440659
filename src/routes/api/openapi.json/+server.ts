import { env } from '$lib/server/env';
import { jsonResponse } from '$lib/server/http/endpoint';
import { describeApi, type RouteModule } from '$lib/server/http/openapi';

/** The description of the API, open to everybody: it tells what can be called and nothing that is stored. */
export const GET = async () => {
	const files = import.meta.glob<RouteModule>(['../**/+server.ts', '!./+server.ts']);
	const modules = await Promise.all(
		Object.entries(files).map(
			async ([file, load]) => [file.replace('..', '/routes/api'), await load()] as const
		)
	);
	return jsonResponse(200, describeApi(Object.fromEntries(modules), env().publicUrl));
};
