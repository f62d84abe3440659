import { describe, expect, it } from 'vitest';
import { admitForm, formFieldOf, toAdmission, type AdmitForm } from './admit-form';
import { admitBody } from './forms';

const FILLED = {
	name: 'Ide Quillfeather',
	birthDate: '1958-09-05',
	sex: 'female',
	mrn: 'S-1042',
	phone: '086 555 0142',
	smsConsent: true,
	email: 'ide@post.example',
	mailConsent: true,
	language: 'es',
	zone: '',
	confirmName: false,
	unit: 'Tern Ward',
	bed: 'T4',
	procedure: 'Bypass',
	approach: 'sternotomy',
	operatedOn: '2026-07-01',
	operatedTime: '09:30',
	surgeonId: '',
	level: '2',
	betaBlocked: 'yes',
	rhythm: ''
} satisfies AdmitForm;

const wrongFields = (change: Partial<AdmitForm>) =>
	(admitForm.safeParse({ ...FILLED, ...change }).error?.issues ?? []).map((issue) => issue.path.join('/'));

describe('admitForm', () => {
	it.each<[Partial<AdmitForm>, string[]]>([
		[{}, []],
		[{ name: ' ' }, ['name']],
		[{ birthDate: '1958-02-30' }, ['birthDate']],
		[{ birthDate: '5 9 1958', operatedOn: '1/7/2026' }, []],
		[{ birthDate: '1958' }, ['birthDate']],
		[{ sex: '' }, ['sex']],
		[{ zone: 'Europe/Dublin' }, []],
		[{ zone: 'Dublin' }, ['zone']],
		[{ mrn: 'x'.repeat(40) }, []],
		[{ mrn: 'x'.repeat(41) }, ['mrn']],
		[{ unit: '' }, ['unit']],
		[{ bed: '' }, []],
		[{ bed: 'x'.repeat(12) }, []],
		[{ bed: 'x'.repeat(13) }, ['bed']],
		[{ level: '0' }, ['level']],
		[{ level: '7' }, ['level']],
		[{ betaBlocked: '' }, ['betaBlocked']],
		[{ rhythm: 'dancing' }, ['rhythm']],
		[{ procedure: '', approach: '', operatedOn: '', operatedTime: '' }, []],
		[{ procedure: '' }, ['procedure']],
		[{ approach: '' }, ['approach']],
		[{ operatedOn: '2026-02-29' }, ['operatedOn']],
		[{ operatedTime: '24:00' }, ['operatedTime']],
		[{ operatedTime: '9:05' }, []],
		[{ operatedTime: '9:5' }, ['operatedTime']],
		[{ operatedOn: '', operatedTime: '' }, ['operatedOn', 'operatedTime']]
	])('%j: wrong is %j', (change, fields) => {
		expect(wrongFields(change)).toEqual(fields);
	});

	it('starts empty, with the cautious answers', () => {
		const empty = admitForm.safeParse({});
		expect(empty.success).toBe(false);
		expect(wrongFields({ level: undefined, betaBlocked: undefined })).toEqual([]);
	});
});

describe('toAdmission', () => {
	it('makes a body that the JSON API takes, in UTC', () => {
		const body = admitBody.parse(toAdmission(FILLED, 'Europe/Dublin'));
		expect(body).toMatchObject({
			patient: { mrn: 'S-1042', smsConsent: true },
			// Dublin is an hour ahead of UTC in July.
			operation: { operatedAt: '2026-07-01T08:30:00.000Z' },
			level: 2,
			betaBlocked: true
		});
		expect([body.surgeonId, body.rhythm]).toEqual([undefined, undefined]);
	});

	it('reads days as they are written here', () => {
		const form = admitForm.parse({ ...FILLED, birthDate: '5 9 1958', operatedOn: '1.7.2026' });
		expect([form.birthDate, form.operatedOn]).toEqual(['1958-09-05', '2026-07-01']);
	});

	it.each([
		['yes', true],
		['no', false],
		['unknown', null]
	])('rate-slowing drug %s is %s', (betaBlocked, value) => {
		expect(toAdmission({ ...FILLED, betaBlocked }, 'Europe/Dublin').betaBlocked).toBe(value);
	});

	it('does not take a consent away because a box is empty', () => {
		const body = admitBody.parse(toAdmission({ ...FILLED, smsConsent: false }, 'Europe/Dublin'));
		expect(body.patient.smsConsent).toBeUndefined();
	});

	it.each([
		['', undefined],
		['America/New_York', 'America/New_York']
	])('the zone "%s" is passed on as %s', (zone, passed) => {
		const body = admitBody.parse(toAdmission({ ...FILLED, zone }, 'Europe/Dublin'));
		expect(body.patient.zone).toBe(passed);
	});

	it('asks no bed of a gym and passes on a confirmed name', () => {
		const body = admitBody.parse(toAdmission({ ...FILLED, bed: '', confirmName: true }, 'Europe/Dublin'));
		expect([body.bed, body.confirmName]).toEqual([undefined, true]);
	});

	it('leaves the operation out where there is none yet', () => {
		const none = { procedure: '', approach: '', operatedOn: '', operatedTime: '' };
		const body = admitBody.parse(toAdmission({ ...FILLED, ...none, phone: '' }, 'Europe/Dublin'));
		expect([body.operation, body.patient.phone]).toEqual([undefined, undefined]);
	});
});

describe('formFieldOf', () => {
	it.each([
		['/patient/mrn', 'mrn'],
		['/bed', 'bed'],
		['/operation/operatedAt', 'operatedOn']
	])('%s is %s', (pointer, field) => {
		expect(formFieldOf(pointer)).toBe(field);
	});
});
