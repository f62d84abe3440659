import { randomUUID } from 'node:crypto';
import { admit, signInAs, type Client } from '../../support/api';

export type Role = 'surgeon' | 'nurse' | 'therapist' | 'physician' | 'coordinator';
export type People = Record<Role, Client>;

export const WHY = { reason: 'Not today.' };
export const OTHER_WHY = { reason: 'Another reason.' };
export const CALL = { grade: 'high', situation: 's', background: 'b', assessment: 'a', request: 'r' };
export const ASK = { kind: 'corridor', question: 'She walks well. May she go out?' };
export const MONTH_MS = 30 * 24 * 60 * 60 * 1000;
export const VISIT = {
	startsAt: new Date(Date.now() + MONTH_MS).toISOString(),
	minutes: 45,
	place: 'East Gym'
};

/** Signs in everybody who takes part in the main job. */
export async function signInAll(url: string): Promise<People> {
	const roles: Role[] = ['surgeon', 'nurse', 'therapist', 'physician', 'coordinator'];
	const pairs: [Role, Client][] = [];
	for (const role of roles) {
		pairs.push([role, await signInAs(url, role)]);
	}
	return Object.fromEntries(pairs) as People;
}

/** Brings things into a state, each time for a patient of their own. */
export class Makers {
	physicianId = '';
	/** When the clearance made last was given; null where it was not. */
	decidedAt: string | null = null;

	constructor(private readonly people: () => People) {}

	episode(): Promise<string> {
		return admit(this.people().surgeon);
	}

	async referral(state: 'asked' | 'accepted' | 'withdrawn') {
		const episodeId = await this.episode();
		const { id, threadId } = await this.#post('surgeon', `/api/episodes/${episodeId}/referrals`, {
			service: 'physiotherapy',
			priority: 'soon',
			question: 'Begin to mobilise.'
		});
		if (state === 'accepted') {
			await this.#post('therapist', `/api/referrals/${id}/accept`, {});
		}
		if (state === 'withdrawn') {
			await this.#post('surgeon', `/api/referrals/${id}/withdraw`, WHY);
		}
		return { id, threadId, episodeId };
	}

	async clearance(state: 'asked' | 'given' | 'withdrawn') {
		const episodeId = await this.episode();
		const { id } = await this.#post('therapist', `/api/episodes/${episodeId}/clearances`, ASK);
		if (state !== 'asked') {
			await this.#post('surgeon', `/api/clearances/${id}/give`, {});
		}
		const { body } = await this.people().surgeon.get(`/api/clearances/${id}`);
		this.decidedAt = body.decidedAt ?? null;
		if (state === 'withdrawn') {
			await this.#post('surgeon', `/api/clearances/${id}/withdraw`, WHY);
		}
		return { id, episodeId };
	}

	async escalation(state: 'raised' | 'taken' | 'passed' | 'settled'): Promise<string> {
		const { id } = await this.#post('therapist', `/api/episodes/${await this.episode()}/escalations`, CALL);
		const path = `/api/escalations/${id}`;
		const { user } = (await this.people().physician.get('/api/me')).body as unknown as {
			user: { id: string };
		};
		this.physicianId = user.id;
		if (state !== 'raised') {
			await this.#post('nurse', `${path}/take`, {});
		}
		if (state === 'passed') {
			await this.#post('nurse', `${path}/pass`, { to: this.physicianId, reason: 'Off duty.' });
		}
		if (state === 'settled') {
			await this.#post('nurse', `${path}/settle`, { outcome: 'stays', note: 'Better.' });
		}
		return String(id);
	}

	async visit(state: 'planned' | 'cancelled'): Promise<string> {
		const { items } = await this.#post('coordinator', `/api/episodes/${await this.episode()}/visits`, VISIT);
		const id = String((items as unknown as { id: string }[])[0]?.id);
		if (state === 'cancelled') {
			await this.#post('coordinator', `/api/visits/${id}/cancel`, {});
		}
		return id;
	}

	async #post(by: Role, path: string, body: object): Promise<Record<string, unknown>> {
		const answer = await this.people()[by].post(path, body, { 'idempotency-key': randomUUID() });
		if (answer.status >= 300) {
			throw new Error(`${path} was answered ${answer.status}: ${answer.text}`);
		}
		return answer.body;
	}
}
