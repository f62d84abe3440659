import type { StreamEvent } from '$lib/domain/live/events';

/**
 * The shape of the stream. sveltekit-sse's `produce` numbers its messages for each connection from 1, which is
 * useless for resuming, and sends its heartbeat as an event. So the cursor of the log travels as the first line
 * of the data and is put into the `id:` line here, and heartbeats become comments.
 */
export type Frame =
	| { kind: 'change'; cursor: number; event: StreamEvent }
	| { kind: 'reset'; cursor: number }
	| { kind: 'cursor'; cursor: number };

/** What is handed to `produce`'s emit: event name and data, cursor first. Only JSON is sent, so no line can be forged. */
export function toEmit(frame: Frame): [name: string, data: string] {
	const payload = frame.kind === 'change' ? JSON.stringify(frame.event) : '{}';
	return [frame.kind, `${frame.cursor}\n${payload}`];
}

/** Rewrite one block that `produce` wrote (without its blank line) into a block of our stream. */
export function rewriteBlock(block: string): string {
	const name = /^event: (.*)$/m.exec(block)?.[1];
	const [cursor = '', data = ''] = [...block.matchAll(/^data: (.*)$/gm)].map((match) => match[1]);
	switch (name) {
		case 'change':
		case 'reset':
			return `id: ${cursor}\nevent: ${name}\ndata: ${data}\n\n`;
		case 'cursor':
			// An id alone moves the client's resume point and dispatches nothing.
			return `id: ${cursor}\n\n`;
		default:
			return ': still here\n\n';
	}
}

/**
 * What a page hears of a heartbeat: comments are not shown to it, so a page that asked for beats gets an event
 * beside them. It has no id and so moves no resume point; its data is the server's instant, milliseconds UTC.
 */
export function beatBlock(now: number): string {
	return `event: beat\ndata: ${now}\n\n`;
}

/** Cut a growing text into whole blocks; the rest waits for more. */
export function takeBlocks(text: string): { blocks: string[]; rest: string } {
	const parts = text.split('\n\n');
	const rest = parts.pop() ?? '';
	return { blocks: parts, rest };
}
