/** What becomes of calls for help when the server is killed in the middle of them. */
import { setTimeout as pause } from 'node:timers/promises';
import { admit, newKey, type Client } from '../support/api';
import type { Product } from '../support/server';

/** The people whom a call needs: who raises it, and two who may take it. */
export interface Crew {
	surgeon: Client;
	therapist: Client;
	takers: [Taker, Taker];
}

export interface Taker {
	client: Client;
	id: string;
}

type Deed = 'raise' | 'take' | 'pass' | 'confirm' | 'settle';
const DEEDS: readonly Deed[] = ['raise', 'take', 'pass', 'confirm', 'settle'];

/** One call as the people know it. A deed keeps its key until it has an answer. */
export interface Call {
	episodeId: string;
	/** So many of the deeds are done to it. */
	deeds: number;
	keys: Map<string, string>;
	done: number;
	id: string | null;
	/** Who was answered that they have it; of two who take at once one alone may be. */
	holders: Set<string>;
}

/** Raised, taken by two at once, passed, confirmed, settled: as far as this call goes, with a kill on the way. */
export async function callThroughKill(
	product: Product,
	crew: Crew,
	random: () => number
): Promise<{ call: Call; readyMs: number }> {
	const call: Call = {
		episodeId: await admit(crew.surgeon),
		deeds: 1 + Math.floor(random() * DEEDS.length),
		keys: new Map(),
		done: 0,
		id: null,
		holders: new Set()
	};
	const going = goOn(crew, call);
	await pause(random() * 150);
	await product.kill('SIGKILL');
	await going;
	const started = performance.now();
	await product.restart();
	const readyMs = performance.now() - started;
	await goOn(crew, call);
	return { call, readyMs };
}

/** Do what is left, each under its key, until all is done or the server does not answer. */
async function goOn(crew: Crew, call: Call): Promise<void> {
	try {
		while (call.done < call.deeds) {
			await doDeed(crew, call, DEEDS[call.done] ?? 'raise');
			call.done += 1;
		}
	} catch (error) {
		// A lost connection: the deed may be done or not, and is asked for again under its key.
		if (!(error instanceof TypeError)) {
			throw error;
		}
	}
}

async function doDeed(crew: Crew, call: Call, deed: Deed): Promise<void> {
	const [first, second] = crew.takers;
	const [holder, other] = call.holders.has(second.id) ? [second, first] : [first, second];
	switch (deed) {
		case 'raise':
			return raise(crew.therapist, call);
		case 'take':
			await Promise.all(crew.takers.map((taker) => take(taker, call)));
			return;
		case 'pass':
			return step(holder.client, call, 'pass', { to: other.id, reason: 'Called away.' });
		case 'confirm':
			return step(other.client, call, 'confirm', {});
		case 'settle':
			return step(other.client, call, 'settle', { outcome: 'Better', note: 'Fluids.', informed: 'Dr Keel' });
	}
}

async function raise(client: Client, call: Call): Promise<void> {
	const { status, body, text } = await client.post(
		`/api/episodes/${call.episodeId}/escalations`,
		{ grade: 'high', situation: 'Fell.', background: 'Bypass.', assessment: 'Too much.', request: 'Come.' },
		headers(call, 'raise')
	);
	expectStatus('raise', status, [201], text);
	const id = String(body.id);
	if (call.id !== null && call.id !== id) {
		throw new Error(`One key raised two calls, ${call.id} and ${id}.`);
	}
	call.id = id;
}

async function take({ client, id }: Taker, call: Call): Promise<void> {
	const path = `/api/escalations/${call.id}/take`;
	const { status, text } = await client.post(path, {}, headers(call, `take ${id}`));
	expectStatus('take', status, [200, 409], text);
	if (status === 200) {
		call.holders.add(id);
	}
}

async function step(client: Client, call: Call, name: Deed, body: object): Promise<void> {
	const { status, text } = await client.post(
		`/api/escalations/${call.id}/${name}`,
		body,
		headers(call, name)
	);
	expectStatus(name, status, [200], text);
}

/** The deed's own key, the same each time it is tried. */
function headers(call: Call, name: string): Record<string, string> {
	const key = call.keys.get(name) ?? newKey();
	call.keys.set(name, key);
	return { 'idempotency-key': key };
}

function expectStatus(deed: string, status: number, allowed: number[], text: string): void {
	if (!allowed.includes(status)) {
		throw new Error(`To ${deed} a call was answered ${status}: ${text}`);
	}
}
