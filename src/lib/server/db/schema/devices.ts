import { index, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { DEVICE_KINDS } from '../../../domain/push/devices';
import { users } from './accounts';
import { id, instant } from './columns';

/** Devices that show notices, one row for each browser that was let. Removed when it is turned off, signed out or gone. */
export const pushDevices = sqliteTable(
	'push_devices',
	{
		id: id(),
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		kind: text('kind', { enum: DEVICE_KINDS }).notNull(),
		/** The SHA-256 of the browser's own cookie, which knows it again also after its sign-in has ended. */
		tokenHash: text('token_hash').notNull().unique(),
		/** The sign-in that it was turned on in, or was last seen in; with no reference, because sign-ins end. */
		signInId: text('sign_in_id'),
		/** Where its push service takes messages for it, and the keys that they are encrypted with. */
		endpoint: text('endpoint').notNull().unique(),
		p256dh: text('p256dh').notNull(),
		auth: text('auth').notNull(),
		createdAt: instant('created_at').notNull(),
		/** When its service last took a message, and last did not. */
		lastSuccessAt: instant('last_success_at'),
		lastFailureAt: instant('last_failure_at')
	},
	(t) => [index('push_devices_user').on(t.userId)]
);
