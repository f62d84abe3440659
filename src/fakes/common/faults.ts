import { readJson, Refusal, sendJson, type Exchange, type Route } from './http';

/** How a fake behaves now. `left` is for how many more requests, null until it is changed. */
export interface Fault<Mode extends string> {
	mode: Mode;
	left: number | null;
}

/** The behaviour for this request; the last of a counted fault puts the fake back to `ok`. */
export function takeFault<Mode extends string>(fault: Fault<Mode | 'ok'>): Mode | 'ok' {
	const { mode, left } = fault;
	if (left !== null) {
		fault.left = left - 1;
		if (left <= 1) {
			fault.mode = 'ok';
			fault.left = null;
		}
	}
	return mode;
}

/** `GET /faults` and `PUT /faults {mode, count?}` over one fault, or at the path that is given. */
export function faultRoutes<Mode extends string>(
	fault: Fault<Mode | 'ok'>,
	modes: readonly (Mode | 'ok')[],
	path = /^\/faults$/
): Route[] {
	const tell = ({ response }: Exchange) =>
		sendJson(response, 200, { mode: fault.mode, count: fault.left, modes });
	return [
		['GET', path, tell],
		[
			'PUT',
			path,
			async (exchange) => {
				const body = await readJson(exchange.request);
				const mode = modes.find((known) => known === body.mode);
				if (!mode) {
					throw new Refusal(422, `mode is '${String(body.mode)}': it must be one of ${modes.join(', ')}.`);
				}
				fault.left = readCount(body.count);
				fault.mode = mode;
				tell(exchange);
			}
		]
	];
}

function readCount(count: unknown): number | null {
	if (count === undefined || count === null) {
		return null;
	}
	if (typeof count !== 'number' || !Number.isInteger(count) || count < 1) {
		throw new Refusal(422, `count is '${String(count)}': it must be a whole number of at least 1.`);
	}
	return count;
}
