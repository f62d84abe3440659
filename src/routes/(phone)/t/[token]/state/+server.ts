import { phonePage } from '$lib/server/escalations/phone';
import { answering, jsonResponse } from '$lib/server/http/endpoint';
import type { RequestHandler } from './$types';

/** What the page of the link shows, for its own refreshing. Reading changes nothing. */
export const GET: RequestHandler = ({ locals, params }) =>
	answering(async () => jsonResponse(200, await phonePage(locals.context, params.token)));
