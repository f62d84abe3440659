import { describe, expect, it } from 'vitest';
import { MESSAGE_STATES } from '$lib/domain/messages/codes';
import { eventWords, isStuck, receiverWords } from './words';

const at = '2026-03-03T09:00:00.000Z';

describe('whom it is for', () => {
	it.each([
		[{ kind: 'staff', name: 'Rose Ferris', role: 'nurse' }, 'Rose Ferris, nurse'],
		[{ kind: 'patient', number: '0123' }, 'a patient, number ends 0123'],
		[{ kind: 'patient', number: null }, 'a patient'],
		[{ kind: 'nobody', number: '9' }, 'an unknown number, ends 9'],
		[{ kind: 'nobody', number: null }, 'nobody']
	] as const)('%j', (to, words) => {
		expect(receiverWords(to)).toBe(words);
	});
});

describe('what happened', () => {
	it.each([
		[{ what: 'written', at }, 'Written with its cause.', null],
		[
			{ what: 'attempt', at, endedAt: at, number: 2, outcome: 'unknown', code: 'ECONNRESET' },
			'Try 2: no answer, perhaps sent',
			'ECONNRESET'
		],
		[
			{ what: 'told', at, status: 'undelivered', errorCode: '30003' },
			'The gateway tells: undelivered',
			'30003'
		],
		[{ what: 'resent', at, by: 'Ana', reason: 'It is back.' }, 'Ana had it sent again: It is back.', null],
		[{ what: 'handled', at, by: 'Ana' }, 'Ana saw to it.', null]
	] as const)('%j', (event, words, code) => {
		expect(eventWords(event)).toEqual({ words, code });
	});
});

it('a person may have to do something about three states', () => {
	expect(MESSAGE_STATES.filter(isStuck)).toEqual(['undelivered', 'failed', 'held']);
});
