import { error } from '@sveltejs/kit';
import { dev } from '$app/environment';
import { env } from '$env/dynamic/public';
import type { PageLoad } from './$types';

/** The page for those who build pages is no part of a hospital's installation. */
export const load: PageLoad = () => {
	if (!dev && env.PUBLIC_STYLE_PAGE !== '1') {
		error(404, 'Not found');
	}
};
