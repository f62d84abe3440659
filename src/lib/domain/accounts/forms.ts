import { z } from 'zod';
import { ROLES } from '../core/codes';
import { text, tooLong } from '../core/fields';

export const PASSWORD_MIN = 15;
export const PASSWORD_MAX = 128;

function noAddress(typed: string): string {
	return typed === ''
		? 'The e-mail address is empty.'
		: `The e-mail address: “${typed}” is none; write one like name@hospital.example.`;
}

const email = z
	.string('The e-mail address is a text.')
	.trim()
	.toLowerCase()
	.max(254, tooLong('The e-mail address', 254))
	.pipe(z.email({ error: ({ input }) => noAddress(String(input)) }));

export const signInBody = z.strictObject({
	email: z
		.string('The e-mail address is a text.')
		.trim()
		.toLowerCase()
		.min(1, 'The e-mail address is empty.')
		.max(254, tooLong('The e-mail address', 254)),
	password: z
		.string('The password is a text.')
		.min(1, 'The password is empty.')
		.max(1024, tooLong('The password', 1024)),
	code: z.string().max(20, tooLong('The code', 20)).optional()
});

/** A new password. Length is what counts; there are no rules on its composition and no expiry. */
export const newPassword = z
	.string('The password is a text.')
	.transform((value) => value.normalize('NFKC'))
	.pipe(
		z
			.string()
			.min(PASSWORD_MIN, `The password has at least ${PASSWORD_MIN} characters.`)
			.max(PASSWORD_MAX, tooLong('The password', PASSWORD_MAX))
			.refine((value) => new Set(value).size >= 5, 'The password repeats the same few characters.')
	);

/** Taking up an invitation: the first administrator also gives name and address. */
export const firstAdminBody = z.strictObject({ name: text('Name', 100), email, password: newPassword });
export const invitedBody = z.strictObject({ password: newPassword });

export const createAccountBody = z.strictObject({
	name: text('The name', 100),
	email,
	role: z.enum(ROLES, 'Choose a role.'),
	phone: z.string().trim().max(30, tooLong('The telephone number', 30)).optional(),
	units: z.array(z.string()).max(50, 'An account has at most 50 units.').default([])
});

export const createUnitBody = z.strictObject({
	name: text('The name of the unit', 40),
	kind: z.enum(['intensive-care', 'ward', 'gym'], 'Choose what kind of unit it is.')
});

/** Changing one's own password; the current one proves that it is its owner who sits at the open screen. */
export const changePasswordForm = z.strictObject({
	current: z
		.string('The current password is a text.')
		.min(1, 'The current password is empty.')
		.max(1024, tooLong('The current password', 1024)),
	next: newPassword
});

/** A deed about one row of a list. */
export const idForm = z.strictObject({
	id: z
		.string('The identifier is a text.')
		.min(1, 'The identifier is empty.')
		.max(64, tooLong('The identifier', 64))
});

/** The units that somebody belongs to. */
export const setUnitsForm = z.strictObject({
	units: z.array(z.string()).max(50, 'An account has at most 50 units.').default([])
});

export const createTokenBody = z.strictObject({ name: text('The name of the token', 60) });
