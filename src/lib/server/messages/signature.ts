import twilio from 'twilio';
import { Problem } from '$lib/domain/core/errors';
import { env } from '../env';
import { readLimited } from '../http/body';

/** The form fields of a call of the gateway; the last one where a name comes twice. */
export type GatewayForm = ReadonlyMap<string, string>;

/**
 * The fields of a signed post of the SMS gateway. The signature covers the address that the gateway was given, so
 * it is checked against the configured public address and never against what the request says of itself.
 * @throws Problem `wrong-signature` when it is missing or does not fit, or when no gateway is configured
 */
export async function readSignedForm(request: Request, path: string): Promise<GatewayForm> {
	const fields = new URLSearchParams(await readLimited(request));
	const { sms, publicUrl } = env();
	const signature = request.headers.get('x-twilio-signature') ?? '';
	if (!sms || !twilio.validateRequest(sms.authToken, signature, publicUrl + path, signedFields(fields))) {
		throw new Problem('wrong-signature', 'The signature is missing or does not fit address and fields.');
	}
	return new Map(fields);
}

/** Repeated names as lists, which is how the signature counts them. */
function signedFields(fields: URLSearchParams): Record<string, string | string[]> {
	const names = [...new Set(fields.keys())];
	return Object.fromEntries(
		names.map((name) => {
			const values = fields.getAll(name);
			return [name, values.length > 1 ? values : (values[0] ?? '')];
		})
	);
}

/** One field that every call of this kind has. @throws Problem `malformed` */
export function requiredField(form: GatewayForm, name: string): string {
	const value = form.get(name);
	if (!value) {
		throw new Problem('malformed', `${name} is missing.`);
	}
	return value;
}
