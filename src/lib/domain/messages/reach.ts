/** Whether a patient may be written to at all, and if not, why: one answer for reminders, news and the page's link. */
export type ReachProblem = 'no-number' | 'no-address' | 'opted-out' | 'no-consent';

export interface Reachable {
	readonly phone: string | null;
	readonly smsConsent: boolean;
	readonly smsOptedOutAt: number | null;
	readonly email: string | null;
	readonly mailConsent: boolean;
}

/** Why no text reaches this patient; null when one may go. */
export function textProblem({ phone, smsConsent, smsOptedOutAt }: Reachable): ReachProblem | null {
	if (phone === null) {
		return 'no-number';
	}
	if (smsOptedOutAt !== null) {
		return 'opted-out';
	}
	return smsConsent ? null : 'no-consent';
}

/** Why no mail reaches this patient; null when one may go. */
export function mailProblem({ email, mailConsent }: Reachable): ReachProblem | null {
	if (email === null) {
		return 'no-address';
	}
	return mailConsent ? null : 'no-consent';
}
