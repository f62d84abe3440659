import type { Env } from '../../env';
import type { Channels } from './channel';
import { mailChannel } from './mail';
import { smsChannel } from './sms';

/** The path that the SMS gateway posts the status of messages to. */
export const SMS_STATUS_PATH = '/api/hooks/sms-status';

/** Open the channels that are configured. @throws Error when a configuration cannot be used */
export function openChannels({ sms, mail, publicUrl }: Pick<Env, 'sms' | 'mail' | 'publicUrl'>): Channels {
	return {
		sms: sms && smsChannel(sms, publicUrl + SMS_STATUS_PATH),
		mail: mail && mailChannel(mail, publicUrl)
	};
}
