import { readiness } from '$lib/server/ready';

/** Ready to serve, or 503 with why not. */
export const GET = async () => {
	const missing = await readiness();
	return new Response(missing.length === 0 ? 'ready\n' : `${missing.join('\n')}\n`, {
		status: missing.length === 0 ? 200 : 503,
		headers: { 'content-type': 'text/plain' }
	});
};
