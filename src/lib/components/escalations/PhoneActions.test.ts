import { render } from 'svelte/server';
import { describe, expect, it } from 'vitest';
import type { Grade } from '$lib/domain/core/codes';
import type { PhoneEscalation } from '$lib/domain/escalations/views';
import PhoneActions from './PhoneActions.svelte';

const RAISED: PhoneEscalation = {
	id: 'e1',
	unit: 'Tern Ward',
	bed: 'T5',
	grade: 'high',
	state: 'raised',
	raisedAt: '2026-03-03T14:00:00Z',
	raisedByRole: 'therapist',
	holder: null,
	takenAt: null,
	mine: false,
	etaAt: null,
	arrivedAt: null,
	asked: false,
	undoUntil: null,
	passedToMe: false,
	usable: true,
	chainStartedAt: '2026-03-03T14:00:00Z',
	steps: [],
	nextAt: '2026-03-03T14:02:00Z'
};
const keys = { take: 'k1', confirm: 'k2', arrive: 'k3', eta: 'k4', untake: 'k5' };

const alarms = (escalation: PhoneEscalation) => {
	const props = { escalation, keys, now: Date.parse(RAISED.raisedAt), signedIn: false, refused: null };
	const { body } = render(PhoneActions, { props });
	return [...body.matchAll(/\bbg-(high|medium|low)\b/g)].map((match) => match[1]);
};

describe('the buttons behind the link of a call', () => {
	it.each<Grade>(['high', 'medium', 'low'])('take a %s call in the colour of its grade', (grade) => {
		expect(alarms({ ...RAISED, grade })).toEqual([grade]);
	});

	it.each<Grade>(['high', 'medium', 'low'])('confirm a %s call in the colour of its grade', (grade) => {
		expect(alarms({ ...RAISED, grade, usable: false, passedToMe: true })).toEqual([grade]);
	});

	it('are in no alarm colour once somebody else has it', () => {
		expect(alarms({ ...RAISED, usable: false, state: 'taken', nextAt: null })).toEqual([]);
	});
});
