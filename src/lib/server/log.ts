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
