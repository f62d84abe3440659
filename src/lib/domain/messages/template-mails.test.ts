import { describe, expect, it } from 'vitest';
import { deniedWords } from './deny-list';
import { mailText } from './templates';
import { VISIT } from './testing/visit';

const PAGE = 'http://127.0.0.1:3000/p/q7Zr2LxV0aYd8KcM3nTfPw';

describe('mails', () => {
	const link = 'https://ropewalk.saltmarsh.example/patients/1';

	it('tell nothing but where to sign in', () => {
		expect(mailText('referrer', { link })).toEqual({
			subject: 'Ropewalk: something to read',
			text: `There is news about a referral of yours. Sign in to read it:\n\n${link}\n\n-- \nRopewalk sends links only. Nobody reads answers to this address.\n`
		});
		expect(mailText('invitation', { link })).toEqual({
			subject: 'Ropewalk: your account',
			text: `Choose a password for your account here; the link works once:\n\n${link}\n\n-- \nRopewalk sends links only. Nobody reads answers to this address.\n`
		});
	});
});

describe('mails to patients', () => {
	it.each([
		['visit-booked', 'en', 'Saltmarsh General: your visit', 'Your visit is Fri 28 Mar 10:00, East Gym.'],
		['visit-booked', 'es', 'Saltmarsh General: su cita', 'Su cita es vie 28 mar 10:00, East Gym.'],
		[
			'series-booked',
			'en',
			'Saltmarsh General: your visits',
			'36 visits are booked for you. Their days and times are in the file.'
		],
		[
			'series-booked',
			'es',
			'Saltmarsh General: sus citas',
			'Tiene 36 citas. Los días y las horas están en el archivo.'
		],
		[
			'visit-moved',
			'en',
			'Saltmarsh General: your visit has moved',
			'Your visit is now Fri 28 Mar 10:00, East Gym.'
		],
		[
			'visit-moved',
			'es',
			'Saltmarsh General: su cita cambia',
			'Su cita es ahora vie 28 mar 10:00, East Gym.'
		],
		[
			'visit-cancelled',
			'en',
			'Saltmarsh General: your visit is cancelled',
			'Your visit Fri 28 Mar 10:00, East Gym is cancelled.'
		],
		[
			'visit-cancelled',
			'es',
			'Saltmarsh General: su cita se ha anulado',
			'Su cita vie 28 mar 10:00, East Gym se ha anulado.'
		],
		[
			'visit-length',
			'en',
			'Saltmarsh General: your visit',
			'Your visit Fri 28 Mar 10:00, East Gym, now takes 60 minutes.'
		],
		[
			'visit-length',
			'es',
			'Saltmarsh General: su cita',
			'Su cita vie 28 mar 10:00, East Gym, dura ahora 60 minutos.'
		],
		['visits-cancelled', 'en', 'Saltmarsh General: your visits are cancelled', 'Your visits are cancelled:'],
		['visits-cancelled', 'es', 'Saltmarsh General: sus citas se han anulado', 'Sus citas se han anulado:']
	] as const)('%s in %s', (template, language, subject, first) => {
		const mail = mailText(template, { ...VISIT, count: 36, minutes: 60, visits: [VISIT] }, language);
		expect(mail.subject).toBe(subject);
		expect(mail.text.split('\n')[0]).toBe(first);
		expect(mail.text).toContain('+353 1 555 0100');
		expect(deniedWords(`${mail.subject} ${mail.text}`)).toEqual([]);
	});

	it.each([
		['visit-booked', 'en', 'puts it into your calendar'],
		['visit-cancelled', 'en', 'takes it out of your calendar'],
		['visits-cancelled', 'en', 'takes them out of your calendar'],
		['visit-booked', 'es', 'lo pone en su calendario'],
		['visit-cancelled', 'es', 'la quita de su calendario'],
		['visits-cancelled', 'es', 'las quita de su calendario']
	] as const)('%s in %s says of the file that it %s', (template, language, does) => {
		expect(mailText(template, { ...VISIT, visits: [VISIT] }, language).text).toContain(does);
	});

	it('of several cancelled visits names each', () => {
		const later = { ...VISIT, startsAt: Date.parse('2025-03-31T09:00:00Z') };
		const { text } = mailText('visits-cancelled', { ...VISIT, visits: [VISIT, later] }, 'en');
		expect(text).toContain('\n\nFri 28 Mar 10:00, East Gym\nMon 31 Mar 10:00, East Gym\n\n');
	});

	it('with the link of the page, which is for the patient alone', () => {
		const mail = mailText('page-link', { ...VISIT, link: PAGE });
		expect(mail.subject).toBe('Saltmarsh General: your visits');
		expect(mail.text).toContain(`\n\n${PAGE}\n\n`);
	});
});
