import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gatewayStops, mayMeanVisit, readPatientReply } from './reply';

describe('readPatientReply', () => {
	it.each([
		'YES',
		'yes',
		' Yes. ',
		'Yés!',
		'y',
		'ＹＥＳ',
		'Yes please',
		'Hello, yes. Thank you!',
		"I'll be there",
		'I’ll be there',
		'I will come',
		'confirmed',
		'SÍ',
		'si, gracias',
		'Confirmo',
		'yes\n'
	])('%j is yes', (text) => {
		expect(readPatientReply(text)).toBe('yes');
	});

	it.each(['ok', 'Okay, thanks', 'Vale', 'De acuerdo', '👍', '👍🏽', '✅'])(
		'%j says that it was read',
		(text) => {
			expect(readPatientReply(text)).toBe('acknowledged');
		}
	);

	it.each([
		'NO',
		'no.',
		'n',
		'Nope',
		'No thanks',
		'Sorry, no',
		"can't come",
		'Cannot make it',
		'not coming',
		'No puedo ir',
		'Lo siento, no puedo',
		'👎'
	])('%j is no', (text) => {
		expect(readPatientReply(text)).toBe('no');
	});

	it.each([
		' Stop. ',
		'BAJA',
		'No más mensajes',
		'STOP',
		'STOP PLEASE',
		'stop!!!',
		'Stóp',
		'STOPALL',
		'stop all',
		'unsubscribe',
		'END',
		'quit',
		'revoke',
		'OPTOUT',
		'opt out',
		'Opt-out',
		'cancel',
		'stop texting me',
		'Please stop sending me these messages',
		'stop these texts now',
		'stop your reminders',
		'no more texts please',
		'unsubscribe me from this list',
		'remove me from your list',
		"don't text me",
		'remove me',
		'take me off your list',
		'No texts please',
		'Do not send me any messages'
	])('%j is stop', (text) => {
		expect(readPatientReply(text)).toBe('stop');
	});

	it.each(['START', 'start', 'unstop', 'Opt in', 'start please'])('%j is start', (text) => {
		expect(readPatientReply(text)).toBe('start');
	});

	it.each(['HELP', 'help', ' Help? ', 'info'])('%j is help', (text) => {
		expect(readPatientReply(text)).toBe('help');
	});

	it.each([
		'',
		'   ',
		'?',
		"don't stop my meds",
		'stop my tablets',
		'should I stop taking it',
		'can I stop',
		'stop it',
		'the pain will not stop',
		'cancel my appointment',
		'cancel Friday',
		'help me',
		'help I feel dizzy',
		'yes but not at ten',
		'yes no',
		'yes 👎',
		'YES or NO',
		'no problem',
		'no, I am ill',
		'not sure',
		'maybe',
		'when do I start',
		'I do not understand',
		"don't",
		'no more',
		'remove it',
		'your message was no help',
		'I got no text',
		'in the end',
		'Is it at 10 or 11?',
		'who is this',
		'да'
	])('%j goes to a person', (text) => {
		expect(readPatientReply(text)).toBe('other');
	});

	it('property: never throws, and case and punctuation do not matter', () => {
		fc.assert(
			fc.property(fc.string({ unit: 'binary' }), (text) => {
				expect(readPatientReply(`${text}.`)).toBe(readPatientReply(` ${text}`));
			})
		);
		const known = fc.constantFrom('yes', 'no', 'stop', 'start', 'help', 'stop all', 'opt out');
		const noise = fc.constantFrom('', ' ', '.', '!', '\n', ' please', '...');
		fc.assert(
			fc.property(known, noise, noise, fc.boolean(), (word, before, after, loud) => {
				const text = `${before} ${loud ? word.toUpperCase() : word} ${after}`;
				expect(readPatientReply(text)).toBe(readPatientReply(word));
				expect(readPatientReply(text)).not.toBe('other');
			})
		);
	});
});

describe('gatewayStops', () => {
	it.each(['STOP', ' stop ', 'StopAll', 'unsubscribe', 'CANCEL', 'end', 'quit', 'revoke', 'OPTOUT'])(
		'%j is ended by the gateway, which says so itself',
		(text) => {
			expect(gatewayStops(text)).toBe(true);
			expect(readPatientReply(text)).toBe('stop');
		}
	);

	it.each([
		'stop please',
		'STOP.',
		'opt out',
		'remove me',
		'no more texts please',
		'stop sending me these messages'
	])('%j is ended by us alone', (text) => {
		expect(gatewayStops(text)).toBe(false);
		expect(readPatientReply(text)).toBe('stop');
	});
});

describe('mayMeanVisit', () => {
	it.each(['CANCEL', ' Cancel. ', 'Please cancel, thanks'])('%j may be about a visit', (text) => {
		expect(readPatientReply(text)).toBe('stop');
		expect(mayMeanVisit(text)).toBe(true);
	});

	it.each(['STOP', 'unsubscribe', 'cancel these texts', 'end'])('%j is about the texts', (text) => {
		expect(mayMeanVisit(text)).toBe(false);
	});
});
