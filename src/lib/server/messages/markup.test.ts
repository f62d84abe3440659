import { describe, expect, it } from 'vitest';
import { readInstructions } from '../../../fakes/gateway/twiml';
import { askedForDigit, markupResponse, spoken } from './markup';

describe('what a call says', () => {
	it.each([
		['plain words', 'It is yours.'],
		['what would be markup', 'Bed <4> & "Window"'],
		['what would end the words', '</Say><Dial>+353860000001</Dial>']
	])('%s are said as they are, and nothing else happens', (_, text) => {
		const { said, gather } = readInstructions(spoken(text));
		expect({ said, gather }).toEqual({ said: [text], gather: null });
		expect(spoken(text).match(/<\w+/g)).toEqual(['<Response', '<Say']);
	});

	it('a line break is a blank', () => {
		expect(spoken('Heron\r\nUnit')).toContain('<Say>Heron Unit</Say>');
	});

	it('is said twice, waiting for one digit each time', () => {
		const markup = askedForDigit('Press 1.', 'https://ropewalk.example/api/hooks/voice?message=1&a=2');
		expect(readInstructions(markup)).toMatchObject({
			said: ['Press 1.', 'Press 1.'],
			gather: { action: 'https://ropewalk.example/api/hooks/voice?message=1&a=2' }
		});
		expect(markup.match(/numDigits="1"/g)).toHaveLength(2);
	});
});

it('an answer without words is an empty document', async () => {
	const response = markupResponse();
	expect(response.headers.get('content-type')).toBe('text/xml; charset=utf-8');
	expect(await response.text()).toBe('<?xml version="1.0" encoding="UTF-8"?><Response/>');
});
