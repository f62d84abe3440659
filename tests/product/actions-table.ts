import type { Role } from '$lib/domain/core/codes';

/** Who may send which form. An action that is missing here fails the test, and so does one that is gone. */
export interface ActionRow {
	/** Fields that the form's own checks let pass, so that the role decides. */
	fields: Record<string, string>;
	roles: readonly Role[] | 'signed-in';
}

const CLINICAL: Role[] = ['surgeon', 'physician', 'nurse', 'therapist', 'speech-therapist'];
const SEEING: Role[] = [...CLINICAL, 'coordinator'];
const NOTING: Role[] = ['surgeon', 'physician', 'nurse', 'therapist'];
const ANSWERING: Role[] = ['therapist', 'speech-therapist'];
const REFERRING: Role[] = ['surgeon', 'physician'];
const ASKING: Role[] = ['therapist', 'speech-therapist', 'nurse', 'physician'];
/** Whoever signs is senior beside their role; of the demonstration's therapists the first is. */
const SIGNING: Role[] = ['therapist', 'physician', 'surgeon'];
const ADMIN: Role[] = ['admin'];

const WHY = { reason: 'Not today.' };
const ASK = { kind: 'stairs', question: 'Six steps went well. May it start?' };
/** A date that no check of the form refuses; that it is past says the server, after it has let the role in. */
const AGREED = { agreedBy: 'Dr Ana Keel', agreedOn: '2026-12-01' };
const WORDING = {
	code: 'arm-exercise',
	name: 'Arms',
	needs: '',
	words: 'A few',
	howTo: 'Slowly.',
	watch: 'Colour.',
	never: 'Alone.'
};
const CALL = {
	grade: 'low',
	situation: 'Pressure fell.',
	background: 'Bypass.',
	assessment: 'Too much.',
	request: 'Please come.'
};
/** An identifier that nothing has. */
export const UNKNOWN = '01890000-0000-7000-8000-000000000000';
const THREAD = '/patients/[id]/threads/[threadId]';
/** An undecided clearance of the demonstration; its kind is one that a physician may decide too. */
const CLEARANCE = '/patients/[id]/clearances/[clearanceId]';

export const ACTIONS: Record<string, ActionRow> = {
	'/account?/password': { fields: { current: 'not it', next: 'eight white egrets fly' }, roles: 'signed-in' },
	'/account?/token': { fields: { name: 'ward clock' }, roles: 'signed-in' },
	'/account?/revoke': { fields: { id: 'none' }, roles: 'signed-in' },
	'/account?/standIn': { fields: {}, roles: 'signed-in' },
	'/account?/try': { fields: { id: 'none' }, roles: 'signed-in' },
	'/account?/forget': { fields: { id: 'none' }, roles: 'signed-in' },
	'/admin/accounts?/account': {
		fields: { name: 'Una Fairlead', email: 'surgeon@saltmarsh.example', role: 'nurse' },
		roles: ADMIN
	},
	'/admin/accounts?/unit': { fields: { name: 'Tern Ward', kind: 'ward' }, roles: ADMIN },
	'/admin/accounts/[id]?/units': { fields: {}, roles: ADMIN },
	'/admin/accounts/[id]?/invite': { fields: { id: 'none' }, roles: ADMIN },
	'/admin/accounts/[id]?/senior': { fields: { id: 'yes' }, roles: ADMIN },
	'/admin/accounts/[id]?/disable': { fields: { id: 'none' }, roles: ADMIN },
	'/admin/accounts/[id]?/enable': { fields: { id: 'none' }, roles: ADMIN },
	'/admin/messages/[id]?/resend': { fields: WHY, roles: ADMIN },
	'/admin/limits?/limit': {
		fields: { set: 'strict', key: 'systolic-ceiling', value: '190', ...AGREED },
		roles: ADMIN
	},
	'/admin/limits?/set': { fields: { set: 'guideline', ...AGREED }, roles: ADMIN },
	'/admin/limits/activities?/word': { fields: { ...WORDING, ...AGREED }, roles: ADMIN },
	'/admin/limits/activities?/reset': { fields: { code: 'arm-exercise', ...AGREED }, roles: ADMIN },
	'/patients/[id]/details?/operation': {
		fields: {
			which: 'further',
			procedure: 'Bypass',
			approach: 'other',
			operatedOn: '1 3 2026',
			operatedTime: '9:05'
		},
		roles: ['coordinator', 'physician', 'surgeon']
	},
	'/patients/[id]/details?/contact': {
		fields: { phone: '+353 86 123 4567', email: '', language: 'en', zone: 'Europe/Dublin' },
		roles: ['coordinator', 'nurse']
	},
	'/escalations/[id]?/take': { fields: {}, roles: ['nurse', 'physician', 'surgeon'] },
	'/loose-ends/[what]/[id]?/message': { fields: {}, roles: ['coordinator', 'therapist'] },
	'/loose-ends/[what]/[id]?/visit': { fields: {}, roles: ['coordinator', 'therapist'] },
	'/loose-ends/[what]/[id]?/text': {
		fields: { note: 'Rang her back.' },
		roles: ['coordinator', 'therapist']
	},
	'/patients/[id]?/wound': { fields: { wound: 'dry', sternum: '', note: '' }, roles: CLINICAL },
	'/patients/[id]?/lineIn': { fields: { kind: 'urinary-catheter' }, roles: NOTING },
	'/patients/[id]?/lineOut': { fields: { id: UNKNOWN }, roles: NOTING },
	'/patients/[id]?/oxygen': { fields: { lpm: '2' }, roles: NOTING },
	'/patients/[id]/refer': {
		fields: { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' },
		roles: REFERRING
	},
	'/patients/[id]/escalate?/raise': { fields: CALL, roles: CLINICAL },
	'/patients/[id]/clearances?/ask': { fields: ASK, roles: ASKING },
	'/patients/[id]/clearances?/acknowledge': {
		fields: { deviationId: UNKNOWN },
		roles: [...REFERRING, 'speech-therapist']
	},
	'/patients/[id]/clearances?/review': { fields: {}, roles: ['surgeon'] },
	'/patients/[id]/level?/decide': {
		fields: { to: '3', reason: 'Walks well.' },
		roles: ['therapist', 'physician']
	},
	'/patients/[id]/level?/sign': { fields: { id: UNKNOWN }, roles: SIGNING },
	'/patients/[id]/level?/refuse': { fields: { id: UNKNOWN, ...WHY }, roles: SIGNING },
	'/patients/[id]/limits?/set': {
		fields: { key: 'systolic-ceiling', value: '170', untilOn: '2026-12-01', ...WHY },
		roles: REFERRING
	},
	'/patients/[id]/limits?/prescribe': {
		fields: { hrMax: '118', method: 'walk-test', note: '' },
		roles: SIGNING
	},
	'/patients/[id]/limits?/endRange': { fields: {}, roles: SIGNING },
	'/patients/[id]/limits?/end': { fields: { id: UNKNOWN }, roles: REFERRING },
	// There is no such unit: the patient stays where they are for the other rows.
	'/patients/[id]/move?/move': { fields: { unit: 'Nowhere', bed: 'A1' }, roles: ['coordinator', 'nurse'] },
	[`${THREAD}?/post`]: { fields: { body: 'She slept well.' }, roles: CLINICAL },
	[`${THREAD}?/seen`]: { fields: { mentionId: 'none' }, roles: SEEING },
	// The thread is one of physiotherapy, asked by the surgeon.
	[`${THREAD}?/accept`]: { fields: {}, roles: ['therapist'] },
	[`${THREAD}?/decline`]: { fields: WHY, roles: ['therapist'] },
	[`${THREAD}?/close`]: { fields: {}, roles: [...REFERRING, ...ANSWERING] },
	[`${THREAD}?/withdraw`]: { fields: WHY, roles: ['surgeon'] },
	[`${THREAD}?/ask`]: { fields: ASK, roles: ASKING },
	// It proposes a limit, so that none has to be said.
	[`${CLEARANCE}?/give`]: { fields: { limit: 'none' }, roles: REFERRING },
	[`${CLEARANCE}?/withhold`]: { fields: WHY, roles: REFERRING },
	[`${CLEARANCE}?/hold`]: { fields: WHY, roles: REFERRING },
	[`${CLEARANCE}?/withdraw`]: { fields: WHY, roles: REFERRING },
	[`${CLEARANCE}?/askBack`]: { fields: WHY, roles: REFERRING },
	[`${CLEARANCE}?/answer`]: { fields: WHY, roles: ASKING },
	// Whoever asked, and nobody else.
	[`${CLEARANCE}?/acknowledge`]: { fields: {}, roles: ['therapist'] },
	'/ward/admit': {
		fields: {
			name: 'Remi Tide',
			birthDate: '1950-01-31',
			sex: 'male',
			mrn: 'ACT 1',
			unit: 'Tern Ward',
			bed: 'ACT1',
			level: '1',
			betaBlocked: 'unknown'
		},
		roles: ['surgeon', 'physician', 'nurse', 'coordinator']
	},
	// The last row about the patient: whoever may close the stay first has closed it.
	'/patients/[id]/move?/close': {
		fields: { reason: 'home' },
		roles: ['coordinator', 'nurse', 'physician']
	}
};
