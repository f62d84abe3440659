import { smsOutcome } from '$lib/domain/messages/outcome';
import { readRetryAfter } from '$lib/domain/messages/retry';
import { now } from '../../clock';
import type { Sent } from './channel';
import { GatewayRefusal } from './gateway-client';

/** Have the gateway make something, a message or a call, and judge how that ended. Never throws. */
export async function judged(create: () => Promise<{ sid: string }>): Promise<Sent> {
	try {
		const { sid } = await create();
		const id = typeof sid === 'string' ? sid : null;
		const outcome = smsOutcome({ kind: 'answered', status: 201, id, code: null, retryAfter: null });
		return { outcome, code: null };
	} catch (error) {
		return judgedError(error);
	}
}

function judgedError(error: unknown): Sent {
	if (error instanceof GatewayRefusal) {
		const { status, code } = error;
		const retryAfter = readRetryAfter(error.retryAfter, now());
		const outcome = smsOutcome({ kind: 'answered', status, id: null, code, retryAfter });
		return { outcome, code: String(code ?? status) };
	}
	const code = (error as { code?: unknown } | null)?.code;
	const known = typeof code === 'string' ? code : null;
	return { outcome: smsOutcome({ kind: 'failed', code: known }), code: known };
}
