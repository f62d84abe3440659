import { describe, expect, it } from 'vitest';
import { CLEARANCE_KINDS, SERVICES, STRANDS } from '../core/codes';
import { LOOSE_END_KINDS } from './loose-ends';
import { owedBy, rolesAsked } from './owed-by';

describe('owedBy', () => {
	it.each([
		['escalation', null, null, 'nursing'],
		['escalation', null, 'physician', 'nursing'],
		['escalation-taken', null, null, 'nursing'],
		['escalation-taken', null, 'nurse', 'nursing'],
		['escalation-taken', null, 'physician', 'medical'],
		['escalation-taken', null, 'surgeon', 'medical'],
		['recheck', null, null, 'nursing'],
		['recheck', null, 'physician', 'medical'],
		['clearance', 'arm-stage', null, 'medical'],
		['clearance', 'stairs', null, 'medical'],
		['clearance', 'oral-intake', null, 'therapy'],
		['clearance-question', 'arm-stage', null, 'therapy'],
		['clearance-question', 'arm-stage', 'nurse', 'nursing'],
		['refusal', 'arm-stage', null, 'therapy'],
		['refusal', 'arm-stage', 'nurse', 'nursing'],
		['deviation', 'arm-stage', null, 'medical'],
		['deviation', 'oral-intake', null, 'therapy'],
		['precautions-due', 'precautions-end', null, 'medical'],
		['referral', 'physiotherapy', null, 'therapy'],
		['referral', 'speech-therapy', null, 'therapy'],
		['sign-off', 'dose', null, 'therapy'],
		['mention', 'nurse', null, 'nursing'],
		['mention', 'surgeon', null, 'medical'],
		['mention', 'coordinator', null, 'patient'],
		['visit-cancelled', null, null, 'patient'],
		['visit-unconfirmed', null, null, 'patient'],
		['visit-closed-day', null, null, 'patient'],
		['visit-unmarked', null, null, 'patient'],
		['visit-untold', 'cancelled', null, 'patient'],
		['message-failed', 'reminder', null, 'patient'],
		['inbound', 'other', null, 'patient']
	] as const)('%s of %s, held by %s: %s', (kind, code, holder, strand) => {
		expect(owedBy({ kind, code }, holder)).toBe(strand);
	});

	it.each(LOOSE_END_KINDS)('%s has a strand', (kind) => {
		expect(STRANDS).toContain(owedBy({ kind, code: null }));
	});
});

describe('rolesAsked', () => {
	it.each([
		['escalation', null, ['surgeon', 'physician', 'nurse']],
		['escalation-taken', null, []],
		['recheck', null, []],
		['mention', 'nurse', []],
		['visit-unconfirmed', null, ['coordinator']],
		['visit-closed-day', null, ['coordinator']],
		['visit-unmarked', null, ['therapist', 'coordinator']],
		['visit-untold', 'moved', ['coordinator']],
		['clearance', 'arm-stage', ['surgeon']],
		['clearance', 'corridor', ['surgeon', 'physician']],
		['clearance', 'oral-intake', ['surgeon', 'speech-therapist']],
		['clearance-question', 'corridor', []],
		['refusal', 'corridor', []],
		['deviation', 'corridor', ['surgeon', 'physician']],
		['precautions-due', 'precautions-end', ['surgeon']],
		['referral', 'physiotherapy', ['therapist']],
		['referral', 'speech-therapy', ['speech-therapist']],
		['sign-off', 'level', ['therapist']],
		['inbound', 'other', ['coordinator']]
	] as const)('%s of %s waits on %j', (kind, code, roles) => {
		expect(rolesAsked({ kind, code })).toEqual(roles);
	});

	it.each([
		...CLEARANCE_KINDS.map((code) => ({ kind: 'clearance', code }) as const),
		...SERVICES.map((code) => ({ kind: 'referral', code }) as const)
	])('somebody can answer $kind of $code', (end) => {
		expect(rolesAsked(end).length).toBeGreaterThan(0);
	});
});
