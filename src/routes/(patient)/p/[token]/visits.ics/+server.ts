import { Problem } from '$lib/domain/core/errors';
import { routes } from '$lib/routes';
import { answering } from '$lib/server/http/endpoint';
import { calendarOfPage } from '$lib/server/patient-page/link';
import type { RequestHandler } from './$types';

/**
 * The visits ahead, for a calendar. Reading changes nothing. A link that has ended, or a page without visits, leads to
 * the page, which says so in the patient's language and whom to call.
 */
export const GET: RequestHandler = ({ locals, params }) =>
	answering(async () => {
		const file = await calendarOfPage(locals.context, params.token).catch(endedAsNone);
		if (file === null) {
			return new Response(null, { status: 303, headers: { location: routes.patientPage(params.token) } });
		}
		return new Response(file, {
			headers: {
				'content-type': 'text/calendar; method=PUBLISH; charset=utf-8',
				'content-disposition': 'attachment; filename="visits.ics"',
				'cache-control': 'no-store',
				'x-robots-tag': 'noindex, nofollow, noarchive'
			}
		});
	});

function endedAsNone(thrown: unknown): null {
	if (thrown instanceof Problem && thrown.code === 'link-ended') {
		return null;
	}
	throw thrown;
}
