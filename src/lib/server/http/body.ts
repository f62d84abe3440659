import { Problem } from '$lib/domain/core/errors';

/** Larger than any honest body of this API; uploads have a way of their own. */
export const MAX_BODY_BYTES = 256 * 1024;
/** A body up to here is read to its end before it is refused: else the client sees a cut connection, not the reason. */
const READ_TO_END_BYTES = 448 * 1024;

/**
 * The JSON body of a request. A missing body counts as `{}`, because several calls need none.
 * @throws Problem 400 malformed, 413 too large, 415 another type
 */
export async function readJson(request: Request): Promise<unknown> {
	const raw = await readLimited(request);
	if (raw.trim() === '') {
		return {};
	}
	const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase();
	if (type !== 'application/json') {
		throw new Problem('wrong-type', `The body is ${type ?? 'of no type'}; send application/json.`);
	}
	try {
		return JSON.parse(raw) as unknown;
	} catch {
		throw new Problem('malformed', 'The body is not valid JSON.');
	}
}

/** Read at most {@link MAX_BODY_BYTES}, without trusting Content-Length, and refuse bytes that are not UTF-8. */
export async function readLimited(request: Request): Promise<string> {
	const chunks: Uint8Array[] = [];
	let size = 0;
	for await (const chunk of request.body ?? []) {
		size += chunk.byteLength;
		if (size > READ_TO_END_BYTES) {
			break;
		}
		if (size <= MAX_BODY_BYTES) {
			chunks.push(chunk);
		}
	}
	if (size > MAX_BODY_BYTES) {
		throw new Problem('too-large', `The body has more than ${MAX_BODY_BYTES} bytes.`);
	}
	try {
		return new TextDecoder('utf-8', { fatal: true }).decode(Buffer.concat(chunks));
	} catch {
		throw new Problem('malformed', 'The body is not valid UTF-8.');
	}
}
