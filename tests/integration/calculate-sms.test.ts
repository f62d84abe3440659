import { expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { POST } from '../../src/routes/api/calculate/sms/+server';
import { callRoute } from '../support/call';

const anybody: Person = { kind: 'person', id: 'p', name: 'Robin', role: 'admin', unitIds: [] };

it.each([
	['', { encoding: 'gsm7', units: 0, segments: 0 }],
	['a'.repeat(160), { encoding: 'gsm7', units: 160, segments: 1 }],
	['a'.repeat(161), { encoding: 'gsm7', units: 161, segments: 2 }],
	['ж'.repeat(71), { encoding: 'ucs2', units: 71, segments: 2 }]
])('answers how long a text is', async (text, body) => {
	expect(await callRoute(POST, anybody, { body: { text } })).toMatchObject({ status: 200, body });
});

it.each([
	['nobody', null, { text: 'a' }, 401],
	['no text', anybody, {}, 422],
	['something beside it', anybody, { text: 'a', more: 1 }, 422],
	['too much', anybody, { text: 'a'.repeat(10_001) }, 422]
])('refuses %s', async (_, person, body, status) => {
	expect((await callRoute(POST, person, { body })).status).toBe(status);
});
