import type { HandleClientError } from '@sveltejs/kit';
import { isUnreached } from '$lib/client/unreached';
import { getLocale, overwriteGetLocale } from '$lib/i18n/paraglide/runtime';

// Each word asks for the language, which is read from the cookie every time; changing it loads the page anew anyway.
const language = getLocale();
overwriteGetLocale(() => language);

/** A page that could not be fetched is not a fault of the page: it says so, with a way to try again. */
export const handleError: HandleClientError = ({ error, message }) =>
	isUnreached(error) ? { message, code: 'unreached' } : { message };
