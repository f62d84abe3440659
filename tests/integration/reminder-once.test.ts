import { beforeEach, describe, expect, it } from 'vitest';
import { env } from '$lib/server/env';
import { linkToken } from '$lib/server/links';
import { openChannels } from '$lib/server/outbox/channels';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { answerOnPage } from '$lib/server/patient-page/link';
import { sendPage } from '$lib/server/patient-page/share';
import { bookVisits, confirmVisit } from '$lib/server/visits/actions';
import { openGateway } from '../support/open-gateway';
import { addPatient, contextOf } from '../support/hospital';
import { remindersOf } from '../support/messages';

/**
 * A reminder whose first attempt ended unknown lies on the telephone already when its visit is confirmed: whichever
 * way that is, the retry must find it there and not send a second one.
 */
const STARTS_AT = Date.parse('2026-03-09T10:00:00Z');
const DUE = Date.parse('2026-03-07T17:00:00Z');
const MINUTE_MS = 60_000;

const { hooks, gateway, hospital } = await openGateway();
beforeEach(() => gateway.fault('sms', 'ok'));

async function settleAt(now: number): Promise<void> {
	hooks.now = now;
	await new OutboxWorker({ channels: openChannels(env()), now: () => now, random: () => 0.5 }).settle();
}

async function booked() {
	const { patient, episodeId } = await addPatient({ unitId: hospital.units.ward });
	const input = { kind: 'single', startsAt: STARTS_AT, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(contextOf(hospital.people.coordinator), episodeId, input);
	return { phone: patient.phone, episodeId, id: result.items[0]?.id ?? '' };
}
type Booked = Awaited<ReturnType<typeof booked>>;

const onPhone = async (phone: string) =>
	(await gateway.messagesOf(phone)).filter(({ body }) => body.includes('your visit is'));

const YES: Record<string, (visit: Booked, now: number) => Promise<unknown>> = {
	'by text': ({ phone }) => gateway.reply(phone, 'YES'),
	'by staff': ({ id }, now) => confirmVisit(contextOf(hospital.people.coordinator, now), id),
	'on the page': async ({ id, episodeId }, now) => {
		const { result } = await sendPage(contextOf(hospital.people.coordinator, now), episodeId, 'sms');
		const holder = { actor: null, now, address: '127.0.0.1', key: null };
		const deed = { deed: 'confirm', visit: id, sequence: 0, why: '', key: '' } as const;
		return answerOnPage(holder, linkToken(result.id), deed);
	}
};

describe.each(Object.keys(YES))('a yes %s between an attempt of unknown end and its retry', (way) => {
	it('leaves one reminder on the telephone, and the retry knows it', async () => {
		const visit = await booked();
		await gateway.fault('sms', 'accept-then-drop', 1);
		await settleAt(DUE);
		const [tried] = await remindersOf(visit.id);
		expect(tried).toMatchObject({ state: 'ready', attempts: 1 });
		expect(await onPhone(visit.phone)).toHaveLength(1);

		hooks.now = DUE + 1;
		await YES[way]?.(visit, DUE + 1);
		const [asking, later] = await remindersOf(visit.id);
		expect(asking?.body).toBe(tried?.body);
		// What nobody has tried yet asks for nothing that was said already.
		expect(later?.body).toContain('Reply NO if you cannot come');
		expect(later?.body).not.toContain('YES');

		await settleAt(DUE + 10 * MINUTE_MS);
		const [sent] = await remindersOf(visit.id);
		expect(await onPhone(visit.phone)).toHaveLength(1);
		expect(sent).toMatchObject({ attempts: 2, providerId: (await onPhone(visit.phone))[0]?.sid });
	});
});
