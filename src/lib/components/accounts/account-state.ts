import { m } from '$lib/i18n/paraglide/messages';

/** What is known of an account that its state follows from; instants are milliseconds UTC. */
export interface StateFacts {
	disabledAt: number | null;
	hasPassword: boolean;
	invitation: { expiresAt: number; mail: string | null } | null;
}

/** Mails that will not arrive by themselves. */
const STUCK = new Set(['held', 'failed', 'undelivered']);

/** The state of an account in words, and whether an administrator has something to do about it. */
export function accountState(
	{ disabledAt, hasPassword, invitation }: StateFacts,
	now: number
): { words: string; open: boolean } {
	if (disabledAt !== null) {
		return { words: m.account_state_disabled(), open: false };
	}
	if (invitation?.mail != null && STUCK.has(invitation.mail)) {
		return { words: m.account_state_mail_stuck(), open: true };
	}
	if (hasPassword) {
		return { words: m.account_state_in_use(), open: false };
	}
	return invitation !== null && invitation.expiresAt > now
		? { words: m.account_state_invited(), open: false }
		: { words: m.account_state_link_old(), open: true };
}
