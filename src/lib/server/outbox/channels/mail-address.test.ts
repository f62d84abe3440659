import { describe, expect, it } from 'vitest';
import { mailAddress, readSender } from './mail-address';

describe('mailAddress', () => {
	it.each([
		'a@b.example',
		"o'neill@saltmarsh.example",
		'first.last+tag@saltmarsh.example',
		'josé@saltmarsh.example'
	])('%s is one mailbox', (address) => {
		expect(mailAddress(address, 'A Name')).toEqual({ address, name: 'A Name' });
	});

	it.each([
		'ok@y.test\r\nBcc: evil@z.test',
		'ok@y.test, evil@z.test',
		'ok@y.test;evil@z.test',
		'ok@y.test evil@z.test',
		'Name <ok@y.test>',
		'"quoted"@y.test',
		'ok@y@z.test',
		'ok@[127.0.0.1]',
		'nobody',
		'@y.test',
		'ok@',
		''
	])('%j is none', (address) => {
		expect(mailAddress(address, null)).toBeNull();
	});

	it('keeps line breaks out of names', () => {
		expect(mailAddress('a@b.example', 'A\r\nBcc: evil@z.test')).toEqual({
			address: 'a@b.example',
			name: 'A Bcc: evil@z.test'
		});
	});
});

describe('readSender', () => {
	it.each([
		['Ropewalk <ropewalk@saltmarsh.example>', 'Ropewalk', 'ropewalk@saltmarsh.example'],
		['"Ropewalk, East" <ropewalk@saltmarsh.example>', 'Ropewalk, East', 'ropewalk@saltmarsh.example'],
		[' ropewalk@saltmarsh.example ', '', 'ropewalk@saltmarsh.example'],
		['<ropewalk@saltmarsh.example>', '', 'ropewalk@saltmarsh.example']
	])('%j', (configured, name, address) => {
		expect(readSender(configured)).toEqual({ name, address });
	});

	it.each(['Ropewalk', 'Ropewalk <nobody>', 'a@b.example, c@d.example', ''])(
		'refuses %j by name',
		(configured) => {
			expect(() => readSender(configured)).toThrow(`MAIL_FROM is '${configured}'`);
		}
	);
});
