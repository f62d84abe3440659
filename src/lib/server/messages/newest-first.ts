import { and, eq, lt, or, type SQL } from 'drizzle-orm';
import type { SQLiteColumn } from 'drizzle-orm/sqlite-core';

/** Where the page after a row begins, in a list that is the newest first. @param at RFC 3339 */
export function cursorOf(at: string, id: string): string {
	return `${Date.parse(at)}.${id}`;
}

/** Older than the last one of the page before; a cursor that is none begins at the newest. */
export function before(at: SQLiteColumn, id: SQLiteColumn, cursor: string | null): SQL | undefined {
	const [, instant = '', last = ''] = /^(\d{1,16})\.([\w-]{1,64})$/.exec(cursor ?? '') ?? [];
	return instant === '' ? undefined : or(lt(at, Number(instant)), and(eq(at, Number(instant)), lt(id, last)));
}
