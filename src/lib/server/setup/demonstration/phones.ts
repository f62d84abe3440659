import { setTimeout as pause } from 'node:timers/promises';
import { isNotNull } from 'drizzle-orm';
import { db } from '../../db';
import { patients, users } from '../../db/schema';
import { env } from '../../env';
import { log } from '../../log';

const TRIES = 8;
const BETWEEN_MS = 1_000;
const PATIENCE_MS = 2_000;

/**
 * Tell the stand-in for the SMS gateway whose the numbers are, so that its page can show phones with names. It may
 * start later than we do; without it the demonstration goes on, with numbers alone.
 */
export async function namePhones(): Promise<void> {
	const items = await ownersOfPhones();
	for (let left = TRIES; left > 0; left -= 1) {
		if (await told(items)) {
			return;
		}
		await pause(BETWEEN_MS, undefined, { ref: false });
	}
	log().warn('the phones of the demonstration have no names: its SMS gateway does not answer');
}

async function ownersOfPhones(): Promise<{ number: string; owner: string }[]> {
	const [staff, treated] = await Promise.all([
		db()
			.select({ number: users.phone, name: users.name, role: users.role })
			.from(users)
			.where(isNotNull(users.phone)),
		db()
			.select({ number: patients.phone, name: patients.name })
			.from(patients)
			.where(isNotNull(patients.phone))
	]);
	return [
		...staff.map(({ number, name, role }) => ({ number, owner: `${name}, ${role.replace('-', ' ')}` })),
		...treated.map(({ number, name }) => ({ number, owner: `${name}, patient` }))
	].flatMap(({ number, owner }) => (number === null ? [] : [{ number, owner }]));
}

async function told(items: { number: string; owner: string }[]): Promise<boolean> {
	try {
		const response = await fetch(`http://127.0.0.1:${env().fakes.sms}/phones`, {
			method: 'PUT',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify({ items }),
			signal: AbortSignal.timeout(PATIENCE_MS)
		});
		return response.ok;
	} catch {
		return false;
	}
}
