import { env } from '../env';
import { pageTokenIn } from './limits';

/**
 * Headers of every answer. The content security policy of pages is Kit's, with a nonce; what is not a page gets
 * the strictest one. Nothing that needs a sign-in is kept by a cache.
 */
export function secureHeaders(response: Response, path: string): Response {
	const { headers } = response;
	headers.set('x-content-type-options', 'nosniff');
	// Other sites learn nothing. 'no-referrer' would also make forms without script send `Origin: null`, which the
	// check of origins takes from patients' pages alone: their address is their secret.
	headers.set('referrer-policy', pageTokenIn(path) === null ? 'same-origin' : 'no-referrer');
	headers.set('cross-origin-opener-policy', 'same-origin');
	headers.set('cross-origin-resource-policy', 'same-origin');
	headers.set('permissions-policy', 'camera=(), microphone=(), geolocation=(), payment=(), usb=()');
	headers.set('x-frame-options', 'DENY');
	if (env().secure) {
		headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
	}
	if (!headers.has('content-security-policy')) {
		headers.set('content-security-policy', "default-src 'none'; frame-ancestors 'none'");
	}
	if (!headers.has('cache-control') && !path.startsWith('/_app/immutable/')) {
		headers.set('cache-control', 'no-store');
	}
	headers.delete('x-sveltekit-page');
	return response;
}
