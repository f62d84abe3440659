import { and, eq, inArray } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { CLOSE_REASONS } from '$lib/domain/core/codes';
import { deniedWords } from '$lib/domain/messages/deny-list';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { closeEpisode } from '$lib/server/episodes/close';
import { acceptReferral, closeReferral, declineReferral, refer } from '$lib/server/referrals/actions';
import { addPatient, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

/** What whoever referred a patient hears by mail when the referral is closed, or the stay is over. */

const hospital = await openHospital({ PUBLIC_URL: 'https://ropewalk.saltmarsh.example' });
const NAME = 'Ide Quillfeather';
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward, name: NAME }));
});

type Who = keyof Hospital['people'];
const as = (role: Who) => contextOf(hospital.people[role]);

async function referredBy(role: Who) {
	const question = 'Breastbone clicks since day 3; is he fit for the stairs?';
	const { result } = await refer(as(role), episodeId, {
		service: 'physiotherapy',
		priority: 'soon',
		question
	});
	await acceptReferral(as('therapist'), result.id);
	return result;
}

/** The mails about these things, whose they are and what they say. */
const mailsAbout = (...ids: string[]) =>
	db()
		.select({ userId: outbox.userId, subject: outbox.subject, body: outbox.body, channel: outbox.channel })
		.from(outbox)
		.where(and(eq(outbox.kind, 'mail'), inArray(outbox.refId, ids)));

/** Nothing of the patient, of the question or of the trade: a subject and one link that opens behind the sign-in. */
function expectLinkOnly(mail: { subject: string | null; body: string } | undefined, path: string): void {
	const text = `${mail?.subject} ${mail?.body}`;
	const link = `https://ropewalk.saltmarsh.example${path}`;
	expect(text.match(/https?:\S+/g)).toEqual([link]);
	expect(text).not.toMatch(/Quillfeather|breastbone|stairs|physio|ward|bed|died|home/i);
	expect(deniedWords(text.replace(link, ''))).toEqual([]);
}

describe('a referral that is closed', () => {
	it('is told to who asked, once, by a link to its thread', async () => {
		const { id, threadId } = await referredBy('surgeon');
		await closeReferral(as('therapist'), id, 'Goals reached, sternum stable.');
		const mails = await mailsAbout(id);
		expect(mails.map(({ userId, channel }) => [userId, channel])).toEqual([
			[hospital.people.surgeon.id, 'mail']
		]);
		expectLinkOnly(mails[0], `/patients/${episodeId}/threads/${threadId}`);
		await expect(closeReferral(as('therapist'), id, null)).rejects.toMatchObject({ code: 'wrong-state' });
		expect(await mailsAbout(id)).toHaveLength(1);
	});

	it('is not told to who closed it', async () => {
		const { id } = await referredBy('physician');
		await closeReferral(as('physician'), id, null);
		expect(await mailsAbout(id)).toEqual([]);
	});

	it('only a closing is told: a refusal waits among the loose ends', async () => {
		const { result } = await refer(as('surgeon'), episodeId, {
			service: 'speech-therapy',
			priority: 'routine',
			question: 'Voice?'
		});
		await declineReferral(as('speech-therapist'), result.id, 'Another service.');
		expect(await mailsAbout(result.id)).toEqual([]);
	});
});

describe('a stay that is over', () => {
	const told = CLOSE_REASONS.filter((reason) => reason !== 'died' && reason !== 'entered-in-error');

	it.each(told)('for %s is told to each who referred, once however often they did', async (reason) => {
		await referredBy('surgeon');
		await referredBy('surgeon');
		await closeEpisode(as('physician'), episodeId, reason);
		const mails = await mailsAbout(episodeId);
		expect(mails.map(({ userId }) => userId)).toEqual([hospital.people.surgeon.id]);
		expectLinkOnly(mails[0], `/patients/${episodeId}`);
	});

	it.each(['died', 'entered-in-error'] as const)('for %s is told to nobody by a machine', async (reason) => {
		await referredBy('surgeon');
		await closeEpisode(as('physician'), episodeId, reason);
		expect(await mailsAbout(episodeId)).toEqual([]);
	});

	it('is not told to who ended it, nor of a referral that was closed before', async () => {
		await referredBy('physician');
		const { id } = await referredBy('surgeon');
		await closeReferral(as('therapist'), id, null);
		await closeEpisode(as('physician'), episodeId, 'home');
		expect(await mailsAbout(episodeId)).toEqual([]);
	});
});
