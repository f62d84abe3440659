import { randomUUID } from 'node:crypto';

/** The demonstration's password, the same for all sign-ins. */
export const PASSWORD = 'ropewalk-demo';
export const SIGN_INS = {
	surgeon: 'surgeon@saltmarsh.example',
	physician: 'physician@saltmarsh.example',
	nurse: 'nurse@saltmarsh.example',
	therapist: 'therapist@saltmarsh.example',
	'speech-therapist': 'speech@saltmarsh.example',
	coordinator: 'coordinator@saltmarsh.example',
	admin: 'admin@saltmarsh.example'
} as const;

export interface Answer {
	status: number;
	headers: Headers;
	// A test looks into an answer with expect(); typing every body again would test the types, not the API.
	body: Record<string, never> & { items: Record<string, never>[] };
	text: string;
}

/** A person's program: keeps the cookie, sends the origin, and parses answers. */
export class Client {
	constructor(
		readonly url: string,
		readonly cookie: string | null
	) {}

	get(path: string, headers: Record<string, string> = {}): Promise<Answer> {
		return this.send('GET', path, undefined, headers);
	}

	post(path: string, body: unknown = {}, headers: Record<string, string> = {}): Promise<Answer> {
		return this.send('POST', path, body, headers);
	}

	async send(
		method: string,
		path: string,
		body?: unknown,
		headers: Record<string, string> = {}
	): Promise<Answer> {
		const response = await fetch(`${this.url}${path}`, {
			method,
			redirect: 'manual',
			headers: {
				...(this.cookie ? { cookie: this.cookie } : {}),
				...(method === 'GET' ? {} : { origin: this.url, 'content-type': 'application/json' }),
				...headers
			},
			body: body === undefined ? null : typeof body === 'string' ? body : JSON.stringify(body)
		});
		const text = await response.text();
		const json = response.headers.get('content-type')?.includes('json');
		return {
			status: response.status,
			headers: response.headers,
			text,
			body: (json ? JSON.parse(text) : {}) as Answer['body']
		};
	}
}

/** Sign in as a role of the demonstration or by address. */
export async function signInAs(
	url: string,
	who: keyof typeof SIGN_INS | string,
	password = PASSWORD
): Promise<Client> {
	const email = who in SIGN_INS ? SIGN_INS[who as keyof typeof SIGN_INS] : who;
	const answer = await new Client(url, null).post('/api/session', { email, password });
	if (answer.status !== 200) {
		throw new Error(`${email} could not sign in: ${answer.status} ${answer.text}`);
	}
	const cookie = answer.headers.get('set-cookie')?.split(';')[0];
	return new Client(url, cookie ?? null);
}

export function newKey(): string {
	return randomUUID();
}

let beds = 0;

/** Admit a patient of one's own, so that tests do not meet at the demonstration's. */
export async function admit(client: Client, more: Record<string, unknown> = {}): Promise<string> {
	beds += 1;
	const answer = await client.post('/api/episodes', {
		patient: {
			name: `Test Patient ${beds}`,
			birthDate: '1950-01-31',
			sex: 'female',
			mrn: `T ${randomUUID()}`
		},
		operation: {
			procedure: 'Bypass',
			approach: 'sternotomy',
			operatedAt: new Date(Date.now() - 4 * 86_400_000).toISOString()
		},
		unit: 'Tern Ward',
		bed: `X${beds}-${randomUUID().slice(0, 4)}`,
		...more
	});
	if (answer.status !== 201) {
		throw new Error(`The patient was not admitted: ${answer.status} ${answer.text}`);
	}
	return String(answer.body.id);
}
