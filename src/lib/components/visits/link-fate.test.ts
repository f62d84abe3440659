import { expect, it } from 'vitest';
import { linkFate } from './link-fate';

it.each([
	['ready', 'The message has not gone yet.', false],
	['sending', 'The message has not gone yet.', false],
	['accepted', 'The message was sent; whether it arrived is not known yet.', false],
	['delivered', 'The message was delivered.', false],
	['undelivered', 'The message was not delivered: reach the patient another way.', true],
	['failed', 'The message could not be sent: reach the patient another way.', true],
	['skipped', 'The message was not sent: reach the patient another way.', true],
	['held', 'The message is held: no gateway is set up.', true],
	['cancelled', 'The message was stopped.', true],
	['unheard of', 'unheard of', true]
])('%s: %s', (message, words, alarming) => {
	expect(linkFate({ message })).toEqual({ words, alarming });
});
