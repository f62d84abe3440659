import { itemsOf, phoneOf, sendJson, startFakes, type Fakes, type Phone } from './fakes';

export interface FakeMail {
	to: string;
	from: string;
	subject: string;
	text: string;
	html: string | null;
}

/** The fakes as the application meets them: its environment, and what a test asks and sets. */
export interface Gateway extends Fakes {
	/** To be set before the environment is read. */
	env: Record<string, string>;
	/** The messages of one telephone, oldest first. */
	messagesOf(number: string): Promise<Phone['messages']>;
	mails(): Promise<FakeMail[]>;
	fault(which: 'sms' | 'mail', mode: string, count?: number): Promise<void>;
	/** Reply from a telephone through the signed webhook. Answers the webhook's HTTP status. */
	reply(number: string, body: string): Promise<number>;
}

/** @param publicUrl where the application, or what stands in for it, gets the webhooks */
export async function startGateway(publicUrl: string, slowMs?: number): Promise<Gateway> {
	const fakes = await startFakes(publicUrl, slowMs);
	const { smsUrl, mailUrl, smtpPort } = fakes;
	return {
		...fakes,
		env: {
			PUBLIC_URL: publicUrl,
			FAKE_SMS_PORT: new URL(smsUrl).port,
			FAKE_MAIL_PORT: new URL(mailUrl).port,
			FAKE_SMTP_PORT: String(smtpPort)
		},
		messagesOf: async (number) => (await phoneOf(fakes, number))?.messages ?? [],
		mails: () => itemsOf<FakeMail>(`${mailUrl}/mails`),
		fault: async (which, mode, count) => {
			const { status, body } = await sendJson('PUT', `${{ sms: smsUrl, mail: mailUrl }[which]}/faults`, {
				mode,
				count
			});
			if (status !== 200) {
				throw new Error(`The fault ${mode} was refused: ${JSON.stringify(body)}`);
			}
		},
		reply: async (number, body) => {
			const answer = await sendJson('POST', `${smsUrl}/phones/${encodeURIComponent(number)}/reply`, { body });
			return Number(answer.body.status);
		}
	};
}
