import type { SuperValidated } from 'sveltekit-superforms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import type { LimitChoice } from '../clearances/decision';

export type ReasonForm = SuperValidated<{ reason: string }, string>;
export type MaybeReasonForm = SuperValidated<{ reason?: string }, string>;
export type AskFields = {
	kind: ClearanceKind;
	question: string;
	threadId?: string;
	limit?: LimitChoice;
	maxMinutes?: string;
	other?: string;
};
export type AskForm = SuperValidated<AskFields, string>;

/** `mention` is the person whom the entry asks; empty for nobody. */
export type EntryFields = { body: string; mention: string };

/** The forms of a thread, as the server's `superValidate` gave them. */
export interface ThreadForms {
	post: SuperValidated<EntryFields, string>;
	seen: SuperValidated<{ mentionId: string }, string>;
	accept: MaybeReasonForm;
	decline: ReasonForm;
	close: MaybeReasonForm;
	withdraw: ReasonForm;
	ask: AskForm;
}

/** The key of each form, made by the server with the page. */
export type ThreadKeys = Record<keyof ThreadForms, string>;
