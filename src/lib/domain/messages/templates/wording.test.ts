import { describe, expect, it } from 'vitest';
import { measureSms } from '../sms-length';
import { dayAndTime, messageLanguage, safeName, shortened } from './wording';

describe('the small parts of a message', () => {
	it.each([
		['2025-03-28T10:00:00Z', 'Europe/Dublin', 'Fri 28 Mar 10:00'],
		['2025-03-31T09:00:00Z', 'Europe/Dublin', 'Mon 31 Mar 10:00'],
		['2025-09-05T23:05:00Z', 'Europe/Dublin', 'Sat 6 Sep 00:05'],
		['2025-12-31T12:00:00Z', 'America/New_York', 'Wed 31 Dec 07:00']
	])('%s in %s is %s', (at, zone, expected) => {
		expect(dayAndTime(Date.parse(at), zone, 'en')).toBe(expected);
	});

	it.each([
		['en', 'en'],
		['en-IE', 'en'],
		['EN_gb', 'en'],
		['es-ES', 'es'],
		['pl', 'en'],
		['', 'en'],
		[null, 'en']
	])('language %j is written to in %s', (language, expected) => {
		expect(messageLanguage(language)).toBe(expected);
	});

	it.each([
		['East Gym', 8, 'East Gym'],
		['East Gym', 7, 'East G.'],
		['East Gym', 6, 'East.'],
		['[[[[', 6, '[[.'],
		['East Gym', 1, '.'],
		['', 5, '']
	])('%j in %i units is %j', (text, units, expected) => {
		expect(shortened(text, units)).toBe(expected);
		expect(measureSms(shortened(text, units)).units).toBeLessThanOrEqual(units);
	});

	it.each([
		['East Gym', 'East Gym'],
		['St Brigid’s', "St Brigid's"],
		['Valve Clinic', 'there'],
		['', 'there']
	])('name %j is sent as %j', (name, expected) => {
		expect(safeName(name, 'there')).toBe(expected);
	});
});
