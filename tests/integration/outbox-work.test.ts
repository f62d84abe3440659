import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { now } from '$lib/server/clock';
import { db } from '$lib/server/db';
import { coverShifts, escalationLinks, escalations, outbox, users } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { settleWork, startWork, stopWork } from '$lib/server/jobs/work';
import { linkDigest } from '$lib/server/links';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { startGateway, type Gateway } from '../support/gateway';
import { makeHospital, type Hospital } from '../support/hospital';
import { addEscalation } from '../support/messages';

/** Chain and outbox together, as the server runs them. */

const HOUR = 60 * 60 * 1000;
const PUBLIC_URL = 'http://127.0.0.1:4303';

let gateway: Gateway;
let hospital: Hospital;
let cleanUp: () => Promise<void>;

beforeAll(async () => {
	gateway = await startGateway(PUBLIC_URL);
	const environment = testEnvironment({ ...gateway.env, PUBLIC_URL });
	const database = await freshDatabase();
	hospital = await makeHospital(now());
	cleanUp = async () => {
		await gateway.stop();
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

it('settling tells the next of the chain, sends what that causes, and leaves nothing due', async () => {
	const { nurse } = hospital.people;
	const raisedAt = now();
	await db()
		.insert(coverShifts)
		.values({
			id: newId(),
			unitId: hospital.units.ward,
			post: 'nurse',
			userId: nurse.id,
			startsAt: raisedAt - HOUR,
			endsAt: raisedAt + HOUR
		});
	const id = await addEscalation(hospital, {
		raisedAt,
		replyCode: '4829',
		chainStartedAt: raisedAt,
		nextStep: 0,
		nextStepAt: raisedAt
	});
	startWork();
	await settleWork();
	await stopWork();

	const [user] = await db().select().from(users).where(eq(users.id, nurse.id));
	const [text, ...more] = await gateway.messagesOf(user?.phone ?? '');
	expect(more).toEqual([]);
	expect(text?.body).toMatch(
		/^Ropewalk HIGH: Tern Ward, bed 4\. To take it open http:\/\/127\.0\.0\.1:4303\/t\/[\w-]{22} or reply TAKE 4829$/
	);
	const [link] = await db().select().from(escalationLinks).where(eq(escalationLinks.escalationId, id));
	expect(link).toMatchObject({
		userId: nurse.id,
		tokenHash: linkDigest(/[\w-]{22}/.exec(text?.body ?? '')?.[0] ?? '')
	});
	const [escalation] = await db().select().from(escalations).where(eq(escalations.id, id));
	expect(escalation).toMatchObject({ nextStep: 1, state: 'raised' });
	expect(await db().$count(outbox, eq(outbox.state, 'ready'))).toBe(0);
});
