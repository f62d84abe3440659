/** The demonstration's people, in the order in which they appear in the main job. */
const SIGN_INS = ['surgeon', 'physician', 'nurse', 'nurse2', 'therapist', 'speech', 'coordinator', 'admin'];

/**
 * Says where the demonstration is and who to sign in as.
 * @param {import('./settings.mjs').Settings} settings
 */
export function tellDemonstration({ publicUrl, smsPort, mailPort }) {
	const people = SIGN_INS.map((name) => `    ${name}@saltmarsh.example`);
	console.log(
		[
			'',
			'The demonstration hospital is ready.',
			'',
			`  Ropewalk            ${publicUrl}`,
			`  Phones and mailbox  http://127.0.0.1:${smsPort}`,
			`  Mails as JSON       http://127.0.0.1:${mailPort}/mails`,
			'',
			'  Sign in with the password ropewalk-demo as',
			...people,
			'',
			'  Everybody in it is invented. Ctrl-C ends it.',
			''
		].join('\n')
	);
}
