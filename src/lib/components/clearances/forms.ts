import type { SuperValidated } from 'sveltekit-superforms';
import type { GiveFields } from './decision-forms';

type ReasonFields = { reason: string; seen: string; shown?: string };

/** The forms of the decider's page, as the server's `superValidate` gave them. */
export interface DecisionForms {
	give: SuperValidated<GiveFields, string>;
	withhold: SuperValidated<ReasonFields, string>;
	hold: SuperValidated<ReasonFields, string>;
	withdraw: SuperValidated<ReasonFields, string>;
	askBack: SuperValidated<ReasonFields, string>;
	answer: SuperValidated<ReasonFields, string>;
}

/** The key of each form, made by the server with the page. */
export type DecisionKeys = Record<keyof DecisionForms, string>;
