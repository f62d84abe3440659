import type { PhoneEscalation } from '$lib/domain/escalations/views';
import { routes } from '$lib/routes';
import { ApiProblem, getJson } from './api';

const EVERY_MS = 4_000;

/** What the page of a link shows, as the server answers it. */
interface PhoneState {
	escalation: PhoneEscalation;
	signedIn: boolean;
	now: number;
}

/**
 * Keep the page of a link fresh without a sign-in, which the live stream would need: ask every few seconds while
 * the page is looked at, and say since when no answer came.
 * @param heard hears the server's instant of each answer
 * @param over hears that the link opens nothing any more, which is an answer too
 */
export function watchPhone(
	token: string,
	initial: PhoneState,
	heard: (now: number) => void,
	over: () => void
) {
	let state = $state.raw(initial);
	let answeredAt = $state.raw(initial.now);
	let lost = $state(false);

	function take(next: PhoneState): void {
		state = next;
		answeredAt = next.now;
		lost = false;
		heard(next.now);
	}

	async function ask(): Promise<void> {
		if (document.visibilityState === 'hidden') {
			return;
		}
		try {
			take(await getJson<PhoneState>(`${routes.phoneLink(token)}/state`));
		} catch (error) {
			if (error instanceof ApiProblem && error.status === 404) {
				over();
			}
			lost = true;
		}
	}

	return {
		get escalation() {
			return state.escalation;
		},
		get signedIn() {
			return state.signedIn;
		},
		/** When the last answer came, milliseconds UTC, while none comes; else null. */
		get lostSince() {
			return lost ? answeredAt : null;
		},
		/** Newer word from the page itself. */
		take,
		/** Ask regularly, and whenever the page comes back into view; answers the function that stops it. */
		start(): () => void {
			const look = () => void ask();
			const timer = setInterval(look, EVERY_MS);
			document.addEventListener('visibilitychange', look);
			return () => {
				clearInterval(timer);
				document.removeEventListener('visibilitychange', look);
			};
		}
	};
}
