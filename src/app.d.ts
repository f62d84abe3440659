import type { IncomingMessage } from 'node:http';
import type { KeptForm } from '$lib/domain/accounts/kept';
import type { Context } from '$lib/server/context';

declare global {
	namespace App {
		interface Locals {
			/** Who asks, when and from where. */
			context: Context;
			/** The sign-in behind the cookie; null for programs and for nobody. */
			signInId: string | null;
			/** Is the sign-in or token of this request good at the moment of asking? For what outlives a request. */
			credentialStillGood: () => Promise<boolean>;
			requestId: string;
			/** A form of this request that found nobody signed in, and that no script has sent: it is answered by a sign-in. */
			kept?: KeptForm;
			/** The language of a page that is not read in the one that its reader chose, such as a patient's own. */
			language?: string;
			/** The live log's cursor from before the page was read. */
			liveCursor: number;
		}
		interface Platform {
			/** The request as Node has it; only the built server hands it over. */
			req?: IncomingMessage;
		}
		interface Error {
			message: string;
			/** The stable code of a problem, where it is one. */
			code?: string;
			/** To quote when something went wrong on our side. */
			id?: string;
		}
	}
}

export {};
