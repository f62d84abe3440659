import { sql, type SQL } from 'drizzle-orm';
import type { SQLiteColumn } from 'drizzle-orm/sqlite-core';
import { spellingKey } from '$lib/domain/episodes/identifiers';

/** Whether a stored number or bed is the one that was typed, whatever case and spaces either has. */
export function spelt(column: SQLiteColumn, typed: string): SQL {
	return sql`upper(replace(${column}, ' ', '')) = ${spellingKey(typed)}`;
}
