import { metricsText } from '$lib/server/metrics';
import type { RequestHandler } from './$types';

/** Open without a sign-in, because it tells counts alone; a reverse proxy need not pass it on. */
export const GET: RequestHandler = async () => {
	const { type, text } = await metricsText();
	return new Response(text, { headers: { 'content-type': type } });
};
