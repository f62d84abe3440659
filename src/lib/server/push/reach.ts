import type { Cookies } from '@sveltejs/kit';
import { eq } from 'drizzle-orm';
import { notFound } from '$lib/domain/core/errors';
import type { DeviceLine } from '$lib/domain/push/devices';
import { deviceBody } from '$lib/domain/push/forms';
import { digestSecret } from '../auth/lucia';
import type { PersonContext } from '../context';
import { db } from '../db';
import { users } from '../db/schema';
import { env } from '../env';
import { newSecret } from '../ids';
import { deviceIn } from './cookie';
import { addDevice, devicesOf } from './devices';

/** By which ways messages reach a person. */
export interface Reach {
	phone: string | null;
	devices: DeviceLine[];
	/** What a browser subscribes with; null where no keys for notices are set up. */
	publicKey: string | null;
	/** Whether the stand-in of a demonstration can show notices. */
	standIn: boolean;
}

export async function reachOf(context: PersonContext, cookies: Cookies): Promise<Reach> {
	const { push } = env();
	const [[user], devices] = await Promise.all([
		db().select({ phone: users.phone }).from(users).where(eq(users.id, context.actor.id)),
		devicesOf(context, deviceIn(cookies))
	]);
	return {
		phone: user?.phone ?? null,
		devices,
		publicKey: push?.publicKey ?? null,
		standIn: push !== null && push.standIn !== null
	};
}

/**
 * In a demonstration: a made-up device whose notices stand on the page of the stand-ins, for a browser that reaches no
 * push service. It is not this browser, and stays when somebody else signs in here.
 * @throws Problem `not-found` where there is no stand-in
 */
export async function addStandInDevice(context: PersonContext): Promise<void> {
	const { push } = env();
	if (!push?.standIn) {
		throw notFound('stand-in');
	}
	const response = await fetch(`${push.standIn}/push/devices`, {
		method: 'POST',
		headers: { 'content-type': 'application/json' },
		body: JSON.stringify({ owner: context.actor.name, applicationServerKey: push.publicKey })
	});
	const tokenHash = digestSecret(newSecret());
	await addDevice(context, deviceBody.parse(await response.json()), {
		...{ kind: 'phone', tokenHash, signInId: null }
	});
}
