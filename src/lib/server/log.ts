import pino from 'pino';
import { env } from './env';

/**
 * The logger: an event name and identifiers, never clinical text, names, addresses, tokens or bodies.
 * The redaction is a second line of defence for objects that carry such fields by mistake.
 */
let logger: pino.Logger | null = null;

export function log(): pino.Logger {
	logger ??= pino({
		level: env().logLevel,
		base: null,
		serializers: { err: safeError },
		redact: {
			paths: [
				'name',
				'email',
				'phone',
				'body',
				'password',
				'token',
				'question',
				'note',
				'*.name',
				'*.email',
				'*.phone',
				'*.body',
				'*.password',
				'*.token',
				'*.question',
				'*.note'
			],
			censor: '[redacted]'
		}
	});
	return logger;
}

/**
 * An error as it may be logged: its kinds, codes and places, never its message. A failed query carries its SQL and
 * its parameters, names and telephone numbers among them, in message, stack and fields.
 */
export function safeError(error: unknown): unknown {
	const chain = [];
	for (let e = error; e instanceof Error && chain.length < 5; e = e.cause) {
		const { code, extendedCode } = e as { code?: unknown; extendedCode?: unknown };
		const frames = (e.stack ?? '').split('\n').filter((line) => /^\s+at /.test(line));
		chain.push({
			type: e.name,
			...(typeof code === 'string' && { code }),
			...(typeof extendedCode === 'string' && { extendedCode }),
			at: frames.slice(0, 8).map((line) => line.trim())
		});
	}
	return chain.length > 0 ? chain : typeof error;
}
