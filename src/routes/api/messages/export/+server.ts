import { requirePermission } from '$lib/server/access/require';
import { requirePerson } from '$lib/server/context';
import { answering } from '$lib/server/http/endpoint';
import { logFilterOf } from '$lib/server/messages/log';
import { exportLog } from '$lib/server/messages/log-export';
import type { RequestHandler } from './$types';

/** The message log as a table for spreadsheets; narrowed as the log is. */
export const GET: RequestHandler = ({ url, locals }) =>
	answering(async () => {
		const context = requirePerson(locals.context);
		requirePermission(context.actor, 'message-log.read');
		return new Response(await exportLog(context, logFilterOf(url)), {
			headers: {
				'content-type': 'text/csv; charset=utf-8',
				'content-disposition': 'attachment; filename="messages.csv"',
				'cache-control': 'no-store'
			}
		});
	});
