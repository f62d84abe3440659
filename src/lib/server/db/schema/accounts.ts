import { index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { ROLES } from '../../../domain/core/codes';
import { id, instant, yesNo } from './columns';

export const units = sqliteTable('units', {
	id: id(),
	name: text('name').notNull().unique(),
	/** A gym has no beds: its visits and escalations name the unit alone. */
	kind: text('kind', { enum: ['intensive-care', 'ward', 'gym'] }).notNull(),
	zone: text('zone').notNull()
});

export const users = sqliteTable('users', {
	id: id(),
	email: text('email').notNull().unique(),
	name: text('name').notNull(),
	role: text('role', { enum: ROLES }).notNull(),
	/** argon2id, with its parameters; null until the invitation was used. */
	passwordHash: text('password_hash'),
	phone: text('phone'),
	/** May go beyond the cautious figure, and signs for juniors who did. */
	senior: yesNo('senior').notNull().default(false),
	createdAt: instant('created_at').notNull(),
	disabledAt: instant('disabled_at')
});

export const userUnits = sqliteTable(
	'user_units',
	{
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id)
	},
	(t) => [primaryKey({ columns: [t.userId, t.unitId] }), index('user_units_unit').on(t.unitId)]
);

/** Browser sign-ins, kept by lucia. The id is the SHA-256 of the cookie's token, never the token. */
export const signIns = sqliteTable(
	'sign_ins',
	{
		id: id(),
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		/** Seconds, not milliseconds: lucia's adapter wants it so. */
		expiresAt: integer('expires_at').notNull(),
		createdAt: instant('created_at').notNull()
	},
	(t) => [index('sign_ins_user').on(t.userId)]
);

/** Personal tokens for programs: `Authorization: Bearer ...`. Only the SHA-256 is stored. */
export const personalTokens = sqliteTable('personal_tokens', {
	id: id(),
	userId: text('user_id')
		.notNull()
		.references(() => users.id),
	name: text('name').notNull(),
	tokenHash: text('token_hash').notNull().unique(),
	createdAt: instant('created_at').notNull(),
	revokedAt: instant('revoked_at')
});

/** Single-use links: the first administrator's, and invitations of new accounts. */
export const invitations = sqliteTable('invitations', {
	id: id(),
	kind: text('kind', { enum: ['first-admin', 'account'] }).notNull(),
	tokenHash: text('token_hash').notNull().unique(),
	userId: text('user_id').references(() => users.id),
	createdAt: instant('created_at').notNull(),
	expiresAt: instant('expires_at').notNull(),
	usedAt: instant('used_at')
});

/** Failed sign-ins by account and by address; they survive a restart. */
export const signInFailures = sqliteTable('sign_in_failures', {
	/** 'account:' or 'address:' and a SHA-256, so that no e-mail address of a stranger is kept. */
	subject: text('subject').primaryKey(),
	count: integer('count').notNull(),
	lastAt: instant('last_at').notNull(),
	blockedUntil: instant('blocked_until')
});
