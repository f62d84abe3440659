import { describe, expect, it } from 'vitest';
import { contactForm, operationForm, toContact, toOperation } from './operation-form';

const FILLED = {
	which: 'corrects',
	procedure: 'Bypass',
	approach: 'sternotomy',
	operatedOn: '1 3 2026',
	operatedTime: '9:05',
	surgeonId: ''
};

describe('operationForm', () => {
	it('makes of a filled form what the API takes, in wall time of the hospital', () => {
		const form = operationForm.parse(FILLED);
		expect(toOperation(form, 'op-1', 'Europe/Dublin')).toEqual({
			procedure: 'Bypass',
			approach: 'sternotomy',
			operatedAt: '2026-03-01T09:05:00.000Z',
			surgeonId: undefined,
			corrects: 'op-1'
		});
	});

	it.each([
		['further', 'op-1', undefined],
		['corrects', null, undefined],
		['corrects', 'op-1', 'op-1']
	])('%s, with %s on record, corrects %s', (which, known, corrects) => {
		const form = operationForm.parse({ ...FILLED, which });
		expect(toOperation(form, known, 'Europe/Dublin').corrects).toBe(corrects);
	});

	it.each([
		['which', ''],
		['procedure', ''],
		['approach', 'through the back'],
		['operatedOn', '31 2 2026'],
		['operatedTime', '24:00'],
		['operatedTime', '']
	])('refuses %s of "%s"', (field, value) => {
		const { error } = operationForm.safeParse({ ...FILLED, [field]: value });
		expect(error?.issues.map(({ path }) => path[0])).toEqual([field]);
	});
});

describe('contactForm', () => {
	it.each([
		['', null],
		[' 086 123 4567 ', '086 123 4567']
	])('of "%s" keeps %s', (phone, kept) => {
		expect(toContact(contactForm.parse({ phone, smsConsent: true }))).toEqual({
			phone: kept,
			smsConsent: true
		});
	});
});
