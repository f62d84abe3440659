import { resendBody } from '$lib/domain/messages/forms';
import { writing } from '$lib/server/http/endpoint';
import { idParam } from '$lib/server/http/param';
import { resendMessage } from '$lib/server/messages/resend';

/** Have a message sent again, with the reason. */
export const POST = writing({
	permission: 'message.resend',
	body: resendBody,
	run: (context, input, event) => resendMessage(context, idParam(event), input)
});
