import { z } from 'zod';
import { tooLong } from '../core/fields';

/** A point of the curve P-256 and sixteen bytes, in base64url, as RFC 8291 has them. */
const P256DH = /^[\w-]{86,88}=?$/;
const AUTH = /^[\w-]{21,24}={0,2}$/;

/** What a browser gives a page that may show notices; its other fields are left out. */
export const deviceBody = z.strictObject({
	endpoint: z.url('The endpoint is no address.').max(2048, tooLong('The endpoint', 2048)),
	keys: z.strictObject({
		p256dh: z.string('The key is a text.').regex(P256DH, 'The key p256dh is no public key of a device.'),
		auth: z.string('The secret is a text.').regex(AUTH, 'The secret auth has sixteen bytes.')
	})
});
export type DeviceBody = z.infer<typeof deviceBody>;
