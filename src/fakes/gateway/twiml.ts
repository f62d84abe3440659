/** What the fake understands of the gateway's markup: words to say, a digit to wait for, texts to answer with. */
export interface Instructions {
	/** Words spoken to the person, in order. */
	said: string[];
	/** Whether a digit is waited for, and the address as written in `action`, null when none is given. */
	gather: { action: string | null } | null;
	/** Bodies of text messages to answer with. */
	replies: string[];
}

const ENTITIES: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

/** Reads the few elements that are used, of a document that the gateway would accept. */
export function readInstructions(xml: string): Instructions {
	const gather = /<Gather\b([^>]*)>/.exec(xml);
	const action = /\baction\s*=\s*(?:"([^"]*)"|'([^']*)')/.exec(gather?.[1] ?? '');
	return {
		said: textsOf(xml, 'Say'),
		gather: gather ? { action: action ? decode(action[1] ?? action[2] ?? '') : null } : null,
		replies: textsOf(xml, 'Message')
	};
}

function textsOf(xml: string, element: string): string[] {
	const found = xml.matchAll(new RegExp(`<${element}\\b[^>]*>([\\s\\S]*?)</${element}>`, 'g'));
	return Array.from(found, ([, inner = '']) => decode(inner.replace(/<[^>]*>/g, '')).trim());
}

function decode(text: string): string {
	return text.replace(/&(?:#x([0-9a-f]+)|#(\d+)|(\w+));/gi, (whole, hex, decimal, name) => {
		if (hex || decimal) {
			return String.fromCodePoint(parseInt(hex ?? decimal, hex ? 16 : 10));
		}
		return ENTITIES[name] ?? whole;
	});
}
