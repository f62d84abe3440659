import { describe, expect, it } from 'vitest';
import { m } from '$lib/i18n/paraglide/messages';
import { accountState } from './account-state';

const NOW = 1_000_000;
const invited = (expiresAt: number, mail: string | null = 'accepted') => ({ expiresAt, mail });
const facts = { disabledAt: null, hasPassword: false, invitation: null };

describe('the state of an account', () => {
	it.each([
		['disabled', { ...facts, disabledAt: 1, hasPassword: true }, m.account_state_disabled(), false],
		['in use', { ...facts, hasPassword: true }, m.account_state_in_use(), false],
		['invited', { ...facts, invitation: invited(NOW + 1) }, m.account_state_invited(), false],
		['invited until this instant', { ...facts, invitation: invited(NOW) }, m.account_state_link_old(), true],
		['without a link', facts, m.account_state_link_old(), true],
		['mail held', { ...facts, invitation: invited(NOW + 1, 'held') }, m.account_state_mail_stuck(), true],
		['mail failed', { ...facts, invitation: invited(NOW + 1, 'failed') }, m.account_state_mail_stuck(), true],
		[
			'forgotten password, new mail failed',
			{ ...facts, hasPassword: true, invitation: invited(NOW + 1, 'undelivered') },
			m.account_state_mail_stuck(),
			true
		],
		[
			'mail not sent yet',
			{ ...facts, invitation: invited(NOW + 1, 'ready') },
			m.account_state_invited(),
			false
		],
		[
			'link without a mail',
			{ ...facts, invitation: invited(NOW + 1, null) },
			m.account_state_invited(),
			false
		],
		[
			'disabled with a mail that failed',
			{ ...facts, disabledAt: 1, invitation: invited(NOW + 1, 'failed') },
			m.account_state_disabled(),
			false
		]
	])('%s', (_, given, words, open) => {
		expect(accountState(given, NOW)).toEqual({ words, open });
	});
});
