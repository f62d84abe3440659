import { expect } from '@playwright/test';
import { Client, newKey, signInAs } from '../support/api';
import type { Product } from '../support/server';
import { mailArrives } from './fakes';

export const EMPTY = 'Plover Ward';
const SENTENCE = 'harbour lights over nine boats';

/** A new unit where nobody lies yet, and one person of each of those roles who belongs to it alone. */
export async function emptyUnit(
	product: Product,
	roles: readonly string[]
): Promise<Record<string, { email: string; password: string }>> {
	const admin = await signInAs(product.url, 'admin');
	await submit(admin, '/admin/accounts?/unit', { name: EMPTY, kind: 'ward' });
	const { text } = await admin.get('/admin/accounts');
	const unit = new RegExp(`value="([\\w-]{36})"[^>]*>(?:(?!<input)[\\s\\S])*?${EMPTY}`).exec(text)?.[1] ?? '';
	expect(unit, 'the identifier of the new unit').not.toBe('');
	const people: Record<string, { email: string; password: string }> = {};
	for (const role of roles) {
		const email = `${role}@plover.example`;
		await submit(admin, '/admin/accounts?/account', { name: `New ${role}`, email, role, units: unit });
		const link = /\/invite\/[\w-]+/.exec((await mailArrives(product.mailUrl, email)).text)?.[0] ?? '';
		await submit(new Client(product.url, null), `${link}?/choose`, { password: SENTENCE });
		people[role] = { email, password: SENTENCE };
	}
	return people;
}

/** Sends a form as the page does. */
async function submit(client: Client, address: string, fields: Record<string, string>): Promise<void> {
	const body = new URLSearchParams({ ...fields, key: newKey() }).toString();
	const { status, text } = await client.send('POST', address, body, {
		'content-type': 'application/x-www-form-urlencoded'
	});
	expect(status, text.slice(0, 300)).toBeLessThan(400);
}
