import { expect } from '@playwright/test';
import { itemsOf, sendJson } from '../support/fakes';

export interface Text {
	sid: string;
	at: string;
	direction: 'in' | 'out';
	body: string;
	status: string;
}

interface Phone {
	number: string;
	owner: string | null;
	messages: Text[];
}

interface Mail {
	to: string;
	subject: string;
	text: string;
}

/** The texts that a phone got, oldest first. */
export async function textsTo(smsUrl: string, owner: RegExp): Promise<Text[]> {
	const phones = await itemsOf<Phone>(`${smsUrl}/phones`);
	const phone = phones.find((each) => owner.test(each.owner ?? '') || owner.test(each.number));
	return (phone?.messages ?? [])
		.filter((message) => message.direction === 'out')
		.toSorted((a, b) => a.at.localeCompare(b.at));
}

/** Wait until a phone has a text that fits, and answer the newest such. */
export async function textArrives(smsUrl: string, owner: RegExp, wanted: RegExp, count = 1): Promise<Text> {
	const fitting = async () => (await textsTo(smsUrl, owner)).filter((text) => wanted.test(text.body));
	await expect.poll(async () => (await fitting()).length).toBeGreaterThanOrEqual(count);
	const newest = (await fitting()).at(-1);
	if (!newest) {
		throw new Error('The text was there and is gone.');
	}
	return newest;
}

export async function reply(smsUrl: string, number: string, body: string): Promise<void> {
	const { status } = await sendJson('POST', `${smsUrl}/phones/${encodeURIComponent(number)}/reply`, { body });
	expect(status).toBeLessThan(300);
}

/** Wait for a mail to an address whose text fits, and answer the newest such. */
export async function mailArrives(mailUrl: string, to: string, wanted = /(?:)/): Promise<Mail> {
	const fitting = async () =>
		(await itemsOf<Mail>(`${mailUrl}/mails`)).filter(
			(mail) => mail.to.includes(to) && wanted.test(mail.text)
		);
	await expect.poll(async () => (await fitting()).length).toBeGreaterThanOrEqual(1);
	const newest = (await fitting()).at(-1);
	if (!newest) {
		throw new Error('The mail was there and is gone.');
	}
	return newest;
}
