import type { Finding } from '$lib/domain/bedside/finding';
import type { Outcome } from '$lib/domain/bedside/codes';
import type { SessionBody } from '$lib/domain/bedside/forms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { ApiProblem, postJson } from './api';

/** A radio hole in a ward can hold a request for minutes; after this long it counts as unanswered. */
const PATIENCE_MS = 20_000;

export interface Recorded {
	id: string;
	findings: Finding[];
	outcome: Outcome;
}

/** How sending a session ended. */
export type Sent =
	| { kind: 'recorded'; recorded: Recorded }
	/** Nothing was recorded: what was done lacks these clearances. */
	| { kind: 'clearance-needed'; kinds: ClearanceKind[] }
	/** Nobody knows whether it arrived; send the very same again. */
	| { kind: 'unanswered' }
	/** Nothing was recorded, and the server says why. */
	| { kind: 'refused'; problem: ApiProblem };

/** Send a session under its key. Never throws what a network or a server can cause. */
export async function sendSession(episodeId: string, body: SessionBody, key: string): Promise<Sent> {
	try {
		const sending = postJson<Recorded>(`/api/episodes/${episodeId}/sessions`, body, key);
		return { kind: 'recorded', recorded: await impatient(sending) };
	} catch (error) {
		if (!(error instanceof ApiProblem)) {
			throw error;
		}
		return endOf(error);
	}
}

function endOf(problem: ApiProblem): Sent {
	if (problem.code === 'clearance-needed') {
		return { kind: 'clearance-needed', kinds: (problem.body.needed ?? []) as ClearanceKind[] };
	}
	const unanswered = problem.status === 0 || problem.status >= 500 || problem.code === 'in-flight';
	return unanswered ? { kind: 'unanswered' } : { kind: 'refused', problem };
}

async function impatient<T>(work: Promise<T>): Promise<T> {
	let timer: ReturnType<typeof setTimeout> | undefined;
	const late = new Promise<never>((_, reject) => {
		timer = setTimeout(() => reject(new ApiProblem(0, 'network', 'No answer in time.')), PATIENCE_MS);
	});
	try {
		return await Promise.race([work, late]);
	} finally {
		clearTimeout(timer);
	}
}
