import type { RequestEvent } from '@sveltejs/kit';

/** The `[id]` of an address. Kit's types know the parameters of each route; shared handlers do not. */
export function idParam(event: RequestEvent): string {
	return event.params.id ?? '';
}
