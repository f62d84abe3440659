import { redirect, type RequestEvent } from '@sveltejs/kit';

/**
 * After a form that was posted without script: lead on, so that a reload does not post it again and the field is
 * empty. With script the page stays as it is and refreshes by itself.
 */
export function leadOnWithoutScript({ request }: RequestEvent, to: string): void {
	if (request.headers.get('x-sveltekit-action') !== 'true') {
		redirect(303, to);
	}
}
