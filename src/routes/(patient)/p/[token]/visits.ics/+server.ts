import { answering } from '$lib/server/http/endpoint';
import { calendarOfPage } from '$lib/server/patient-page/link';
import type { RequestHandler } from './$types';

/** The visits ahead, for a calendar. Reading changes nothing. */
export const GET: RequestHandler = ({ locals, params }) =>
	answering(async () => {
		const file = await calendarOfPage(locals.context, params.token);
		return new Response(file, {
			headers: {
				'content-type': 'text/calendar; method=PUBLISH; charset=utf-8',
				'content-disposition': 'attachment; filename="visits.ics"',
				'cache-control': 'no-store',
				'x-robots-tag': 'noindex, nofollow, noarchive'
			}
		});
	});
