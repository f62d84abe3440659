/** What is shorter gains nothing: a network sends it in one packet either way. */
const WORTH_BYTES = 1024;
const TEXT = /^(text\/(?!event-stream)|application\/(json|problem\+json|xml))/;

/**
 * The answer as it goes out: text packed with gzip for whoever says that they take it. A ward of forty lanes is a
 * quarter of a MiB otherwise, a second and a half on a phone's network. Left alone are streams, which must not be
 * held back; answers that know to be short; and the files of the build, which are packed already. Packing tells the
 * length of what is packed, so an answer may hold no secret beside words of a stranger's choosing: tokens of
 * sign-ins stand in cookies alone, which other sites' requests do not carry.
 */
export function compressed(request: Request, response: Response): Response {
	const { headers, body, status, statusText } = response;
	if (!body || !TEXT.test(headers.get('content-type') ?? '') || headers.has('content-encoding')) {
		return response;
	}
	// Also on what is not packed this time: a cache between must not give one reader what another one takes.
	headers.append('vary', 'accept-encoding');
	if (!takesGzip(request.headers.get('accept-encoding')) || isShort(headers)) {
		return response;
	}
	headers.set('content-encoding', 'gzip');
	headers.delete('content-length');
	// It names the bytes before they were packed.
	headers.delete('etag');
	return new Response(body.pipeThrough(new CompressionStream('gzip')), { status, statusText, headers });
}

/** Whether `gzip` is named, and not with a weight of nothing: RFC 9110, 12.5.3. */
function takesGzip(accepted: string | null): boolean {
	return (accepted ?? '')
		.toLowerCase()
		.split(',')
		.some((each) => /^\s*gzip\s*(;\s*q=(?!0(\.0*)?\s*$)|$)/.test(each));
}

function isShort(headers: Headers): boolean {
	const length = headers.get('content-length');
	return length !== null && Number(length) < WORTH_BYTES;
}
