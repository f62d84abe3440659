/**
 * What a text that somebody sent us means. A patient's answer is understood only when the whole of it is one of
 * the known ways to say it: 'don't stop my tablets' and 'yes but not at ten' go to a person.
 *
 * The words that end texts are those of the United States' rule of 2024 (stop, quit, end, revoke, opt out,
 * cancel, unsubscribe; any reasonable wording counts) and those that gateways obey by themselves. Whatever language
 * patients are written to in, they may answer in any that the texts have.
 */
export const PATIENT_REPLIES = ['yes', 'no', 'stop', 'start', 'help', 'acknowledged', 'other'] as const;
export type PatientReply = (typeof PATIENT_REPLIES)[number];

const PHRASES: Record<Exclude<PatientReply, 'other'>, readonly string[]> = {
	stop: [
		'stop',
		'stop all',
		'stopall',
		'end',
		'quit',
		'revoke',
		'cancel',
		'unsubscribe',
		'opt out',
		'optout',
		'remove me',
		'baja',
		'darme de baja',
		'parar',
		'alto',
		'no mas',
		'no mas textos',
		'no mas mensajes'
	],
	start: ['start', 'unstop', 'resume', 'subscribe', 'opt in', 'optin', 'alta', 'empezar', 'reanudar'],
	help: ['help', 'info', 'ayuda'],
	yes: [
		'yes',
		'y',
		'yep',
		'yeah',
		'yup',
		'confirm',
		'confirmed',
		'i confirm',
		'i will come',
		'i will be there',
		'ill be there',
		'i am coming',
		'im coming',
		'will come',
		'will be there',
		'see you then',
		'see you there',
		'si',
		'confirmo',
		'confirmado',
		'alli estare',
		'ahi estare',
		'voy',
		'ire',
		'si voy',
		'si ire',
		'si puedo'
	],
	/** Says that it was read. It is a yes only where something was asked. */
	acknowledged: ['ok', 'okay', 'vale', 'de acuerdo', 'thumbs up'],
	no: [
		'no',
		'n',
		'nope',
		'not coming',
		'i am not coming',
		'im not coming',
		'cannot come',
		'can not come',
		'cant come',
		'cannot make it',
		'can not make it',
		'cant make it',
		'unable to come',
		'unable to make it',
		'will not come',
		'wont come',
		'wont be there',
		'will not be there',
		'no puedo',
		'no puedo ir',
		'no puedo venir',
		'no podre ir',
		'no voy',
		'no ire',
		'no asistire'
	]
};

/** Ways to say stop that count only when the rest names the texts. */
const ENDINGS = [...PHRASES.stop, 'no more', 'no', 'remove', 'take off', 'do not', 'dont'];

/** What gateways take for STOP by themselves, when it is the whole text; they then send the one last text. */
const GATEWAY_STOPS = ['stop', 'stopall', 'unsubscribe', 'cancel', 'end', 'quit', 'revoke', 'optout'];

/** Whether the gateway has ended the texts by itself. Every other way to say it has to be confirmed by us. */
export function gatewayStops(text: string): boolean {
	return GATEWAY_STOPS.includes(text.trim().toLowerCase());
}

/**
 * Whether a text that ends the texts may as well have been meant for a visit: gateways take 'cancel' for STOP, and a
 * patient who was just reminded may mean what it says.
 */
export function mayMeanVisit(text: string): boolean {
	return withoutManners(text) === 'cancel';
}

/** Said to be polite, or before the answer: it changes nothing. */
const POLITE =
	/\b(please|pls|plz|thanks|thank you|thx|ta|cheers|sorry|hello|hi|dear|sir|madam|gracias|muchas|por favor|hola|buenos dias|buenas tardes|perdon|lo siento)\b/g;
/** What somebody wants to end: 'stop sending me these messages' is 'stop'. */
const ABOUT_TEXTS =
	/\b(to|sending|send|getting|texting|messaging|texts?|messages?|sms|reminders?|me|my|us|the|these|this|those|of|from|your|list|now|any|it)\b/g;

/** Understand a patient's text. Case, accents and punctuation do not matter. */
export function readPatientReply(text: string): PatientReply {
	const plain = withoutManners(text);
	const exact = (['yes', 'no', 'help', 'start', 'acknowledged'] as const).find((kind) => says(kind, plain));
	if (exact) {
		return exact;
	}
	return says('stop', plain) || endsTexts(plain) ? 'stop' : 'other';
}

function withoutManners(text: string): string {
	return collapsed(words(text).replace(POLITE, ' '));
}

function says(kind: Exclude<PatientReply, 'other'>, plain: string): boolean {
	return PHRASES[kind].includes(plain);
}

/** 'end it' may be about anything; only a sentence about texts ends them. */
function endsTexts(plain: string): boolean {
	const aboutTexts = /\b(text|messag|sms|reminder|list)/.test(plain);
	return aboutTexts && ENDINGS.includes(collapsed(plain.replace(ABOUT_TEXTS, ' ')));
}

/** What was typed, as it is compared: lower case, without accents, apostrophes closed up, everything else that is no letter or digit a space. */
export function words(text: string): string {
	const lower = text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();
	const spoken = lower
		.replace(/👍\p{Emoji_Modifier}?|✅|👌/gu, ' thumbs up ')
		.replace(/👎\p{Emoji_Modifier}?/gu, ' no ');
	return collapsed(spoken.replace(/['’`´]/g, '').replace(/[^\p{L}\p{N}]+/gu, ' '));
}

function collapsed(text: string): string {
	return text.replace(/\s+/g, ' ').trim();
}
