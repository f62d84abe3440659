import type { Env } from '../../env';
import type { Channels } from './channel';
import { mailChannel } from './mail';
import { pushChannel } from './push';
import { smsChannel } from './sms';
import { voiceChannel } from './voice';

/** The path that the SMS gateway posts the status of messages to. */
export const SMS_STATUS_PATH = '/api/hooks/sms-status';
/** The paths that it posts a pressed digit and the status of calls to. */
export const VOICE_PATH = '/api/hooks/voice';
export const VOICE_STATUS_PATH = '/api/hooks/voice-status';

/** Open the channels that are configured. @throws Error when a configuration cannot be used */
export function openChannels({
	sms,
	mail,
	push,
	publicUrl
}: Pick<Env, 'sms' | 'mail' | 'push' | 'publicUrl'>): Channels {
	return {
		sms: sms && smsChannel(sms, publicUrl + SMS_STATUS_PATH),
		mail: mail && mailChannel(mail, publicUrl),
		push: push && pushChannel(push),
		voice:
			sms && voiceChannel(sms, { digitUrl: publicUrl + VOICE_PATH, statusUrl: publicUrl + VOICE_STATUS_PATH })
	};
}
