import { expect, it } from 'vitest';
import { readInstructions } from './twiml';

it.each([
	['nothing', '', { said: [], gather: null, replies: [] }],
	['an empty document', '<Response/>', { said: [], gather: null, replies: [] }],
	[
		'words and a digit to wait for',
		'<Response><Gather numDigits="1" action="https://a.test/d?x=1&amp;y=2"><Say language="en">Press 1</Say></Gather></Response>',
		{ said: ['Press 1'], gather: { action: 'https://a.test/d?x=1&y=2' }, replies: [] }
	],
	[
		'an address in single quotes',
		"<Response><Gather action='/digits'/></Response>",
		{ said: [], gather: { action: '/digits' }, replies: [] }
	],
	[
		'a digit to wait for without an address',
		'<Response><Gather/></Response>',
		{ said: [], gather: { action: null }, replies: [] }
	],
	[
		'texts to answer with, plain and in a body',
		'<Response><Message>Tom &amp; I &#8364;5</Message><Message><Body>&#x41;&lt;b&gt;</Body></Message></Response>',
		{ said: [], gather: null, replies: ['Tom & I €5', 'A<b>'] }
	]
])('reads %s', (_what, xml, instructions) => {
	expect(readInstructions(xml)).toEqual(instructions);
});
