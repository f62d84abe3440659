import { csvOf } from '$lib/domain/core/csv';
import type { LogFilter, LogLine, LogReceiver } from '$lib/domain/messages/log';
import type { PersonContext } from '../context';
import { write } from '../write';
import { listMessages } from './log';

const PAGE = 200;
/** So many are exported at most; whoever needs more narrows the log. */
export const EXPORT_MAX = 10_000;

const COLUMNS = ['id', 'written', 'kind', 'channel', 'to', 'state', 'reason', 'attempts'] as const;

/** The log as a table for spreadsheets, without the texts. That it was taken is on record. */
export async function exportLog(context: PersonContext, filter: LogFilter): Promise<string> {
	const lines: LogLine[] = [];
	for (let after: string | null = null; ;) {
		const { items, next } = await listMessages(context, filter, { limit: PAGE, after });
		lines.push(...items);
		if (next === null || lines.length >= EXPORT_MAX) {
			break;
		}
		after = next;
	}
	await write(context, 'message-log.read', () =>
		Promise.resolve({
			result: null,
			audit: {
				action: 'message-log.exported',
				objectKind: 'message-log',
				objectId: 'all',
				detail: { messages: lines.length, state: filter.state, channel: filter.channel }
			}
		})
	);
	return csvOf([COLUMNS, ...lines.map(rowOf)]);
}

function rowOf({ id, createdAt, kind, channel, to, state, reason, attempts }: LogLine) {
	return [id, createdAt, kind, channel, receiverOf(to), state, reason, attempts];
}

function receiverOf(to: LogReceiver): string {
	return to.kind === 'staff' ? `${to.name} (${to.role})` : `${to.kind} ...${to.number ?? ''}`;
}
