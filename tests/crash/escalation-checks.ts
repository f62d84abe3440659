import type { EscalationView } from '$lib/domain/escalations/views';
import type { Client } from '../support/api';
import type { Product } from '../support/server';
import type { Call } from './escalations';

const MINUTE = 60_000;
/** Where a call stands after so many of raise, take, pass, confirm and settle. */
const STATE_AFTER = ['raised', 'taken', 'taken', 'taken', 'settled'];

/** What must hold of the calls: each is there as its answers said, with one holder, or with a chain that goes on. */
export async function checkCalls(product: Product, client: Client, calls: Call[]): Promise<string[]> {
	const wrong: string[] = [];
	const untaken: EscalationView[] = [];
	for (const call of calls) {
		const view = await viewOf(client, call.id);
		wrong.push(...faultsOf(call, view));
		if (view.state === 'raised') {
			untaken.push(view);
		}
	}
	// Every planned step of the chain and a repeat are due by then.
	await product.advance(30 * MINUTE);
	for (const before of untaken) {
		const { steps } = await viewOf(client, before.id);
		if (steps.length <= before.steps.length) {
			wrong.push(`the chain of ${before.id} did not go on`);
		}
	}
	return wrong;
}

function faultsOf(call: Call, view: EscalationView): string[] {
	const faults: string[] = [];
	const state = STATE_AFTER[call.deeds - 1];
	if (view.state !== state) {
		faults.push(`${call.id} is ${view.state} after ${call.deeds} deeds`);
	}
	if (call.holders.size > 1) {
		faults.push(`${call.id} was given to two`);
	}
	if ((view.holder === null) !== (state === 'raised') && state !== 'settled') {
		faults.push(`${call.id} is ${view.state} and has ${view.holder ? 'a' : 'no'} holder`);
	}
	if (state === 'raised' && view.next === null) {
		faults.push(`${call.id} waits, and nobody is told next`);
	}
	return faults;
}

async function viewOf(client: Client, id: string | null): Promise<EscalationView> {
	const { status, body } = await client.get(`/api/escalations/${id}`);
	if (status !== 200) {
		throw new Error(`The call ${id} is lost: ${status}`);
	}
	return body as unknown as EscalationView;
}
