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
		]
	] as const)('%s in %s', (template, language, subject, first) => {
		const mail = mailText(template, { ...VISIT, count: 36 }, language);
		expect(mail.subject).toBe(subject);
		expect(mail.text.split('\n')[0]).toBe(first);
		expect(mail.text).toContain('+353 1 555 0100');
		expect(deniedWords(`${mail.subject} ${mail.text}`)).toEqual([]);
	});

	it('with the link of the page, which is for the patient alone', () => {
		const mail = mailText('page-link', { ...VISIT, link: PAGE });
		expect(mail.subject).toBe('Saltmarsh General: your visits');
		expect(mail.text).toContain(`\n\n${PAGE}\n\n`);
	});
});
