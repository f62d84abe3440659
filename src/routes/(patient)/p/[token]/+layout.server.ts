import { env } from '$lib/server/env';
import { languageOfPage } from '$lib/server/patient-page/link';
import type { LayoutServerLoad } from './$types';

/** The page needs no script at all: it works on any telephone, and nothing of the link leaves it. */
export const csr = false;

/** What the frame of a patient's page shows, its error page included. Neither a cache nor a search engine keeps it. */
export const load: LayoutServerLoad = async ({ locals, params, setHeaders }) => {
	setHeaders({ 'cache-control': 'no-store', 'x-robots-tag': 'noindex, nofollow, noarchive' });
	const { name, phone, emergency } = env().hospital;
	const language = await languageOfPage(params.token);
	locals.language = language;
	return { language, hospital: { name, phone, emergency } };
};
