import { describe, expect, it } from 'vitest';
import { contactBody } from './operation';
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
		const form = { phone, smsConsent: true, language: 'es', zone: 'Europe/Dublin' };
		expect(contactBody.parse(toContact(contactForm.parse(form)))).toEqual({
			phone: kept,
			smsConsent: true,
			email: null,
			mailConsent: false,
			language: 'es',
			zone: 'Europe/Dublin'
		});
	});

	it.each(['', 'Dublin', '+01:00', 'Europe/Atlantis'])('refuses the zone "%s" and says so', (zone) => {
		const { error } = contactForm.safeParse({ language: 'en', zone });
		expect(error?.issues).toMatchObject([
			{
				path: ['zone'],
				message: `Time zone of the patient is '${zone}': it must be the name of a time zone such as Europe/Dublin.`
			}
		]);
	});
});
