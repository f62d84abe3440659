import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { admit, newKey, PASSWORD, signInAs, SIGN_INS, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';

let product: Product;
let surgeon: Client;
let nurse: Client;
/** The cookie of a sign-in that has ended. */
let ended: string | null;
let episodeId: string;
let threadId: string;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	surgeon = await signInAs(product.url, 'surgeon');
	nurse = await signInAs(product.url, 'nurse');
	const gone = await signInAs(product.url, 'nurse');
	await gone.send('DELETE', '/api/session');
	ended = gone.cookie;
	episodeId = await admit(surgeon);
	const { body } = await surgeon.post(`/api/episodes/${episodeId}/referrals`, {
		service: 'physiotherapy',
		priority: 'soon',
		question: 'Begin to mobilise.'
	});
	threadId = String(body.threadId);
});
afterAll(() => product?.stop());

const WORDS = 'Drain out\r\nat <14:10> & "dry"';

interface Page {
	status: number;
	text: string;
	headers: Headers;
}

/** Post a form as a browser without script does. */
async function submit(path: string, fields: [string, string][], cookie: string | null = null): Promise<Page> {
	const response = await fetch(product.url + path, {
		method: 'POST',
		redirect: 'manual',
		headers: {
			origin: product.url,
			accept: 'text/html',
			'content-type': 'application/x-www-form-urlencoded',
			...(cookie && { cookie })
		},
		body: new URLSearchParams(fields).toString()
	});
	return { status: response.status, text: await response.text(), headers: response.headers };
}

/** The fields that the kept form of a page would send, read from its HTML. */
function keptFields({ text }: Page): [string, string][] {
	const form = /<form[^>]*action="\/sign-in\/send"[\s\S]*?<\/form>/.exec(text)?.[0] ?? '';
	const to = /name="signInTo" value="([^"]*)"/.exec(form)?.[1] ?? '';
	const areas = [...form.matchAll(/<textarea hidden[^>]* name="([^"]*)"[^>]*>([\s\S]*?)<\/textarea>/g)];
	return [
		['signInTo', plain(to)],
		...areas.map(([, name = '', value = '']): [string, string] => [name, plain(value)])
	];
}

function plain(html: string): string {
	const names: Record<string, string> = { lt: '<', gt: '>', quot: '"', amp: '&' };
	return html.replaceAll(/&(lt|gt|quot|amp);/g, (_, name: string) => names[name] ?? '');
}

const credentials = (email: string, password = PASSWORD): [string, string][] => [
	['signInEmail', email],
	['signInPassword', password]
];

/** Everything from the sign-in on, as the browser does it: the redirect keeps method and body. */
async function signInAndSend(
	fields: [string, string][],
	email: string
): Promise<Page & { to: string | null }> {
	const all = [...fields, ...credentials(email)];
	const signedIn = await submit('/sign-in/send', all);
	expect(signedIn.status).toBe(307);
	const to = signedIn.headers.get('location');
	const cookie = signedIn.headers.get('set-cookie')?.split(';')[0] ?? null;
	return { ...(await submit(to ?? '', all, cookie)), to };
}

const entry = (): [string, string][] => [
	['key', newKey()],
	['body', WORDS]
];
const thread = () => `/patients/${episodeId}/threads/${threadId}`;

describe('a form without script whose sign-in has ended', () => {
	it('is kept, shown, and sent on with the sign-in, once', async () => {
		const page = await submit(`${thread()}?/post`, entry(), ended);
		expect(page.status).toBe(401);
		expect(page.text).toContain('Your sign-in has ended');
		expect(page.text).toContain('Drain out');
		const fields = keptFields(page);
		expect(fields.map(([name]) => name)).toEqual(['signInTo', 'key', 'body']);
		const sent = await signInAndSend(fields, SIGN_INS.nurse);
		expect(sent.to).toBe(`${thread()}?/post`);
		expect([200, 303]).toContain(sent.status);
		await signInAndSend(fields, SIGN_INS.nurse);
		const { body } = await nurse.get(`/api/threads/${threadId}`);
		const said = body.items.map((item) => String(item.body).replaceAll('\r\n', '\n'));
		expect(said.filter((text) => text === WORDS.replaceAll('\r\n', '\n'))).toHaveLength(1);
	});

	it('is kept through a wrong password, and never shows it', async () => {
		const page = await submit(`${thread()}?/post`, entry());
		const wrong = [...keptFields(page), ...credentials(SIGN_INS.physician, 'not the password')];
		const again = await submit('/sign-in/send', wrong);
		expect(again.status).toBe(401);
		expect(keptFields(again)).toEqual(keptFields(page));
		expect(again.text).not.toContain('not the password');
		expect(again.text).toContain(SIGN_INS.physician);
	});

	it.each([
		['a referral', () => `/patients/${episodeId}/refer`, 'question'],
		['a call for help', () => `/patients/${episodeId}/escalate?/raise`, 'situation'],
		[
			'a decision',
			() => `/patients/${episodeId}/clearances/01890000-0000-7000-8000-000000000000?/give`,
			'note'
		],
		['a taking', () => '/escalations/01890000-0000-7000-8000-000000000000?/take', 'etaMinutes']
	])('keeps %s', async (_, path, field) => {
		const fields: [string, string][] = [
			['key', 'k1'],
			[field, WORDS]
		];
		const page = await submit(path(), fields, ended);
		expect([page.status, keptFields(page)[0]]).toEqual([401, ['signInTo', path()]]);
		expect(keptFields(page)[2]?.[0]).toBe(field);
	});

	it.each(['https://evil.example/', '//evil.example', '', 'javascript:alert(1)'])(
		'is not sent to %j',
		async (to) => {
			const fields: [string, string][] = [['signInTo', to], ...credentials(SIGN_INS.nurse)];
			const { status, headers } = await submit('/sign-in/send', fields);
			expect([status, headers.get('set-cookie')]).toEqual([400, null]);
		}
	);

	it('leads to the sign-in who only looks', async () => {
		const { status, headers } = await nurse.get('/sign-in/send');
		expect([status, headers.get('location')]).toEqual([303, '/sign-in']);
	});
});
