import type { Role } from '$lib/domain/core/codes';

/** Who may call what. A route that is missing here fails the test, and so does one that is gone. */
export interface Row {
	/** Roles that are let in; others get 403 (API) or are turned away (pages). */
	roles: readonly Role[] | 'everyone' | 'signed-in';
	/** Answer to a role that is let in and sends nothing useful: 404 for an unknown id, 422 for an empty body. */
	answers: readonly number[];
}

const CLINICAL: Role[] = ['surgeon', 'physician', 'nurse', 'therapist', 'speech-therapist'];
const SEEING: Role[] = [...CLINICAL, 'coordinator'];
const DECIDERS: Role[] = ['surgeon', 'physician', 'speech-therapist'];
const NOTING: Role[] = ['surgeon', 'physician', 'nurse', 'therapist'];
const TAKERS: Role[] = ['nurse', 'physician', 'surgeon'];

export const API: Record<string, Row> = {
	'POST /api/session': { roles: 'everyone', answers: [422] },
	'DELETE /api/session': { roles: 'signed-in', answers: [204] },
	'GET /api/me': { roles: 'signed-in', answers: [200] },
	'GET /api/live': { roles: 'signed-in', answers: [200] },
	'GET /api/openapi.json': { roles: 'everyone', answers: [200] },
	'GET /api/activities': { roles: 'signed-in', answers: [200] },
	'POST /api/assess': { roles: 'signed-in', answers: [422] },
	// A score with everything missing is an answer of its own: no total, and what is missing.
	'POST /api/calculate/early-warning': { roles: 'signed-in', answers: [200] },
	'POST /api/calculate/energy': { roles: 'signed-in', answers: [422] },
	'POST /api/calculate/heart-rate-target': { roles: 'signed-in', answers: [422] },
	'POST /api/calculate/pressures': { roles: 'signed-in', answers: [422] },
	'POST /api/calculate/walk-test': { roles: 'signed-in', answers: [422] },
	'POST /api/calculate/sms': { roles: 'signed-in', answers: [422] },
	'PUT /api/demo/clock': { roles: 'everyone', answers: [422] },
	'POST /api/hooks/sms': { roles: 'everyone', answers: [403] },
	'POST /api/hooks/sms-status': { roles: 'everyone', answers: [403] },
	'POST /api/hooks/voice': { roles: 'everyone', answers: [403] },
	'POST /api/hooks/voice-status': { roles: 'everyone', answers: [403] },
	'GET /api/messages': { roles: ['admin'], answers: [200] },
	'GET /api/messages/export': { roles: ['admin'], answers: [200] },
	'GET /api/messages/received': { roles: ['admin'], answers: [200] },
	'GET /api/messages/[id]': { roles: ['admin'], answers: [404] },
	'POST /api/messages/[id]/resend': { roles: ['admin'], answers: [422] },
	'GET /api/delivery': { roles: 'signed-in', answers: [200] },
	'GET /api/loose-ends': { roles: SEEING, answers: [200] },
	'GET /api/episodes': { roles: SEEING, answers: [200] },
	'POST /api/episodes': { roles: ['coordinator', 'nurse', 'physician', 'surgeon'], answers: [422] },
	'GET /api/episodes/[id]': { roles: SEEING, answers: [404] },
	'POST /api/episodes/[id]/move': { roles: ['coordinator', 'nurse'], answers: [422] },
	'POST /api/episodes/[id]/operations': { roles: ['coordinator', 'physician', 'surgeon'], answers: [422] },
	'POST /api/episodes/[id]/contact': { roles: ['coordinator', 'nurse'], answers: [404] },
	'POST /api/episodes/[id]/session-amendments': {
		roles: ['therapist', 'speech-therapist', 'nurse', 'physician'],
		answers: [422]
	},
	'POST /api/episodes/[id]/close': { roles: ['coordinator', 'nurse', 'physician'], answers: [422] },
	'POST /api/episodes/[id]/referrals': { roles: ['surgeon', 'physician'], answers: [422] },
	'POST /api/episodes/[id]/clearances': {
		roles: ['therapist', 'speech-therapist', 'nurse', 'physician'],
		answers: [422]
	},
	'GET /api/units/[id]/limits': { roles: 'signed-in', answers: [404] },
	'POST /api/units/[id]/limits': { roles: ['admin'], answers: [422] },
	'POST /api/units/[id]/activities': { roles: ['admin'], answers: [422] },
	'POST /api/units/[id]/limit-set': { roles: ['admin'], answers: [422] },
	'GET /api/episodes/[id]/level': { roles: CLINICAL, answers: [404] },
	'POST /api/episodes/[id]/level': { roles: ['therapist', 'physician'], answers: [422] },
	// Whoever signs is senior beside their role; the demonstration's therapist is.
	'POST /api/sign-offs/[id]/sign': { roles: ['therapist', 'physician', 'surgeon'], answers: [404] },
	'POST /api/sign-offs/[id]/refuse': { roles: ['therapist', 'physician', 'surgeon'], answers: [422] },
	'GET /api/episodes/[id]/limits': { roles: CLINICAL, answers: [404] },
	'POST /api/episodes/[id]/limits': { roles: ['physician', 'surgeon'], answers: [422] },
	'GET /api/episodes/[id]/prescribed-ranges': { roles: CLINICAL, answers: [404] },
	'POST /api/episodes/[id]/prescribed-ranges': {
		roles: ['therapist', 'physician', 'surgeon'],
		answers: [422]
	},
	'POST /api/episodes/[id]/prescribed-ranges/end': {
		roles: ['therapist', 'physician', 'surgeon'],
		answers: [404]
	},
	'POST /api/limits/[id]/end': { roles: ['physician', 'surgeon'], answers: [404] },
	'POST /api/episodes/[id]/wound-notes': { roles: CLINICAL, answers: [422] },
	'POST /api/episodes/[id]/lines': { roles: NOTING, answers: [422] },
	'POST /api/lines/[id]/out': { roles: NOTING, answers: [404] },
	'POST /api/episodes/[id]/oxygen-notes': { roles: NOTING, answers: [422] },
	'GET /api/episodes/[id]/sessions': { roles: CLINICAL, answers: [404] },
	'POST /api/episodes/[id]/sessions': {
		roles: ['therapist', 'speech-therapist', 'nurse', 'physician'],
		answers: [422]
	},
	'POST /api/episodes/[id]/escalations': { roles: CLINICAL, answers: [422] },
	'GET /api/episodes/[id]/visits': { roles: SEEING, answers: [404] },
	'POST /api/episodes/[id]/visits': { roles: ['coordinator', 'therapist'], answers: [422] },
	'POST /api/referrals/[id]/accept': { roles: ['therapist', 'speech-therapist'], answers: [404] },
	'POST /api/referrals/[id]/decline': { roles: ['therapist', 'speech-therapist'], answers: [422] },
	'POST /api/referrals/[id]/close': {
		roles: ['surgeon', 'physician', 'therapist', 'speech-therapist'],
		answers: [404]
	},
	'POST /api/referrals/[id]/withdraw': { roles: ['surgeon', 'physician'], answers: [422] },
	'GET /api/threads/[id]': { roles: SEEING, answers: [404] },
	'POST /api/threads/[id]/entries': { roles: CLINICAL, answers: [422] },
	'POST /api/mentions/[id]/seen': { roles: SEEING, answers: [404] },
	'GET /api/clearances/[id]': { roles: SEEING, answers: [404] },
	'POST /api/clearances/[id]/give': { roles: DECIDERS, answers: [404] },
	'POST /api/clearances/[id]/withhold': { roles: DECIDERS, answers: [422] },
	'POST /api/clearances/[id]/hold': { roles: DECIDERS, answers: [422] },
	'POST /api/clearances/[id]/ask-back': { roles: DECIDERS, answers: [422] },
	'POST /api/clearances/[id]/answer': {
		roles: ['therapist', 'speech-therapist', 'nurse', 'physician'],
		answers: [422]
	},
	'POST /api/clearances/[id]/withdraw': { roles: SEEING, answers: [422] },
	'POST /api/clearances/[id]/acknowledge': { roles: SEEING, answers: [404] },
	'GET /api/alarms': { roles: 'signed-in', answers: [200] },
	'POST /api/deviations/[id]/acknowledge': { roles: DECIDERS, answers: [404] },
	'GET /api/escalations/[id]': { roles: CLINICAL, answers: [404] },
	'POST /api/escalations/[id]/take': { roles: TAKERS, answers: [404] },
	'POST /api/escalations/[id]/untake': { roles: TAKERS, answers: [404] },
	'POST /api/escalations/[id]/eta': { roles: TAKERS, answers: [422] },
	'POST /api/escalations/[id]/inform': { roles: TAKERS, answers: [422] },
	'POST /api/escalations/[id]/arrive': { roles: TAKERS, answers: [404] },
	'POST /api/escalations/[id]/pass': { roles: TAKERS, answers: [422] },
	'POST /api/escalations/[id]/confirm': { roles: TAKERS, answers: [404] },
	'POST /api/escalations/[id]/settle': { roles: TAKERS, answers: [422] },
	'POST /api/escalations/[id]/withdraw': { roles: CLINICAL, answers: [422] },
	'GET /api/episodes/[id]/patient-page': { roles: SEEING, answers: [404] },
	'POST /api/episodes/[id]/patient-page': { roles: ['coordinator', 'therapist'], answers: [422] },
	'POST /api/patient-pages/[id]/end': { roles: ['coordinator', 'therapist'], answers: [404] },
	'POST /api/devices': { roles: 'signed-in', answers: [422] },
	'GET /api/closed-days': { roles: 'signed-in', answers: [200] },
	'POST /api/closed-days': { roles: ['coordinator', 'admin'], answers: [422] },
	'POST /api/closed-days/[id]/open': { roles: ['coordinator', 'admin'], answers: [404] },
	'POST /api/visits/[id]/move': { roles: ['coordinator', 'therapist'], answers: [422] },
	'GET /api/visits': { roles: SEEING, answers: [200, 422] },
	'POST /api/visits/[id]/confirm': { roles: ['coordinator', 'therapist'], answers: [404] },
	'POST /api/visits/[id]/cancel': { roles: ['coordinator', 'therapist'], answers: [404] },
	'POST /api/visits/[id]/reopen': { roles: ['coordinator', 'therapist', 'nurse'], answers: [422] },
	'POST /api/visits/[id]/follow-up': { roles: ['coordinator', 'therapist'], answers: [404] },
	'POST /api/visits/[id]/attend': { roles: ['coordinator', 'therapist', 'nurse'], answers: [404] },
	'POST /api/visits/[id]/miss': { roles: ['coordinator', 'therapist', 'nurse'], answers: [404] }
};

/** The handlers that are no part of the API, nor of a page. */
export const OUTSIDE: Record<string, Row> = {
	'GET /healthz': { roles: 'everyone', answers: [200] },
	'GET /readyz': { roles: 'everyone', answers: [200] },
	'GET /metrics': { roles: 'everyone', answers: [200] },
	'GET /demo': { roles: 'everyone', answers: [303] },
	'GET /phones': { roles: 'everyone', answers: [303] },
	'POST /sign-out': { roles: 'everyone', answers: [303] },
	'GET /p/[token]/visits.ics': { roles: 'everyone', answers: [404] },
	'GET /t/[token]/state': { roles: 'everyone', answers: [404] }
};

/** A form that needs no sign-in: whoever sends it, the fields alone decide. */
export interface OpenForm {
	fields: Record<string, string>;
	answer: number;
	/** What a page that does not say where it is gets; 403 where left out. A patient's page sends no referrer. */
	fromNowhere?: number;
}

const PASSWORD = 'eight white egrets fly';

export const OPEN_FORMS: Record<string, OpenForm> = {
	'/sign-in': { fields: {}, answer: 422 },
	'/sign-in/send': { fields: {}, answer: 400 },
	'/invite/[token]?/become': {
		fields: { name: 'Una Fairlead', email: 'una@saltmarsh.example', password: PASSWORD },
		answer: 404
	},
	'/invite/[token]?/choose': { fields: { password: PASSWORD }, answer: 404 },
	'/t/[token]': { fields: { deed: 'take' }, answer: 404 },
	'/p/[token]': { fields: { deed: 'confirm', visit: 'none', sequence: '0' }, answer: 404, fromNowhere: 404 }
};
