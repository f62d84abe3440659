import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import type { z } from 'zod';
import { can } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import { localParts } from '$lib/domain/core/time';
import { zoneGroups } from '$lib/domain/core/zones';
import { formFieldOf } from '$lib/domain/episodes/admit-form';
import { contactBody, recordOperationBody } from '$lib/domain/episodes/operation';
import {
	contactForm,
	operationForm,
	toContact,
	toOperation,
	type ContactForm,
	type OperationForm
} from '$lib/domain/episodes/operation-form';
import type { Nameboard } from '$lib/domain/episodes/views';
import { m } from '$lib/i18n/paraglide/messages';
import { requirePermission } from '$lib/server/access/require';
import { env } from '$lib/server/env';
import { recordOperation } from '$lib/server/episodes/operation';
import { amendContact } from '$lib/server/episodes/patient';
import { surgeonsFor } from '$lib/server/episodes/surgeons';
import { formAction } from '$lib/server/http/form-action';
import { newFormKey, pageLoad } from '$lib/server/http/page';
import { idParam } from '$lib/server/http/param';
import { invalidBody } from '$lib/server/http/problem';
import { consentByText } from '$lib/server/messages/consent';
import { read } from '$lib/server/read';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = (event) =>
	pageLoad(event, async (context) => {
		const { actor } = context;
		if (!can(actor, 'operation.record')) {
			requirePermission(actor, 'contact.amend');
		}
		const board = await read.nameboard(context, idParam(event));
		return {
			corrections: await read.corrections(context, board.id),
			consentByText: await consentByText(board.id),
			surgeons: await surgeonsFor(actor),
			operation: await superValidate<OperationForm, string>(onRecord(board), zod4(operationForm), {
				id: 'operation',
				errors: false
			}),
			contact: await superValidate<ContactForm, string>(contactOnRecord(board), zod4(contactForm), {
				id: 'contact',
				errors: false
			}),
			zones: zoneGroups(board.patient.zone ?? env().hospital.zone),
			keys: { operation: newFormKey(), contact: newFormKey() }
		};
	});

/** What the record says, to be put right; without an operation the form is for the first one. */
function onRecord({ procedure, approach, operatedAt, surgeon }: Nameboard): Partial<OperationForm> {
	const at = operatedAt === null ? null : localParts(Date.parse(operatedAt), env().hospital.zone);
	return {
		which: at === null ? 'further' : 'corrects',
		procedure: procedure ?? '',
		approach: approach ?? '',
		operatedOn: at?.date ?? '',
		operatedTime: at?.time ?? '',
		surgeonId: surgeon?.id ?? ''
	};
}

function contactOnRecord({ patient }: Nameboard): Partial<ContactForm> {
	const { phone, email, language = '', smsConsent, mailConsent, zone = env().hospital.zone } = patient;
	return { phone: phone ?? '', email: email ?? '', language, smsConsent, mailConsent, zone };
}

export const actions: Actions = {
	operation: formAction({
		id: 'operation',
		schema: operationForm,
		async run(context, fields, event) {
			const board = await read.nameboard(context, idParam(event));
			const body = toOperation(fields, board.operationId, env().hospital.zone);
			await besideFields(() => recordOperation(context, board.id, bodyOf(recordOperationBody, body)));
			return m.patient_details_saved();
		}
	}),
	contact: formAction({
		id: 'contact',
		schema: contactForm,
		async run(context, fields, event) {
			await amendContact(context, idParam(event), bodyOf(contactBody, toContact(fields)));
			return m.patient_details_saved();
		}
	})
};

/** What the JSON API would take; its checks have the last word. */
function bodyOf<Body>(schema: z.ZodType<Body>, body: unknown): Body {
	const parsed = schema.safeParse(body);
	if (!parsed.success) {
		throw invalidBody(parsed.error);
	}
	return parsed.data;
}

/** The API speaks of an instant where the form has a day and a time. */
async function besideFields<T>(work: () => Promise<T>): Promise<T> {
	try {
		return await work();
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
		const { code, detail, extra } = thrown;
		const errors = extra.errors?.map(({ pointer, message }) => ({
			pointer: `/${formFieldOf(pointer)}`,
			message
		}));
		throw new Problem(code, detail, { ...extra, errors });
	}
}
