import { describe, expect, it } from 'vitest';
import type { Person } from '../access/actor';
import type { ReferralState, Role, Service } from '../core/codes';
import { threadOfDeed } from './thread-of-deed';

const person = (role: Role): Person => ({ kind: 'person', id: role, name: role, role, unitIds: ['ward'] });
const thread = (service: Service, state: ReferralState) => ({ service, state });

const PHYSIO = thread('physiotherapy', 'accepted');
const SPEECH = thread('speech-therapy', 'accepted');
const SPEECH_ASKED = thread('speech-therapy', 'asked');
const PHYSIO_CLOSED = thread('physiotherapy', 'closed');

describe('the thread of a deed', () => {
	it.each([
		['therapist', [PHYSIO, SPEECH], PHYSIO],
		['speech-therapist', [PHYSIO, SPEECH], SPEECH],
		['speech-therapist', [SPEECH_ASKED, PHYSIO], SPEECH_ASKED],
		['therapist', [PHYSIO_CLOSED, SPEECH], SPEECH],
		['therapist', [PHYSIO, PHYSIO_CLOSED], PHYSIO],
		['nurse', [PHYSIO, SPEECH], SPEECH],
		['surgeon', [PHYSIO, SPEECH_ASKED], PHYSIO],
		['surgeon', [SPEECH_ASKED], SPEECH_ASKED],
		['surgeon', [PHYSIO_CLOSED], null],
		['therapist', [], null]
	] as const)('of a %s, case %#', (role, threads, expected) => {
		expect(threadOfDeed(threads, person(role))).toBe(expected);
	});

	it('is the newest accepted one for what no person does', () => {
		expect(threadOfDeed([SPEECH, PHYSIO, SPEECH_ASKED], null)).toBe(PHYSIO);
	});
});
