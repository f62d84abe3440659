import type { HandleClientError } from '@sveltejs/kit';
import { isUnreached } from '$lib/client/unreached';

/** A page that could not be fetched is not a fault of the page: it says so, with a way to try again. */
export const handleError: HandleClientError = ({ error, message }) =>
	isUnreached(error) ? { message, code: 'unreached' } : { message };
