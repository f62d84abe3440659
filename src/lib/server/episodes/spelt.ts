import { sql, type SQL } from 'drizzle-orm';
import type { SQLiteColumn } from 'drizzle-orm/sqlite-core';
import { NUMBER_SIGNS, numberKey, spellingKey } from '$lib/domain/episodes/identifiers';

/** Whether a stored bed is the one that was typed, whatever case and spaces either has. */
export function isBed(column: SQLiteColumn, typed: string): SQL {
	return sql`upper(${without(sql`${column}`, [' '])}) = ${spellingKey(typed)}`;
}

/** Whether a stored hospital number is the one that was typed, whatever case, spaces and signs either has. */
export function isNumber(column: SQLiteColumn, typed: string): SQL {
	return sql`upper(${without(sql`${column}`, [' ', ...NUMBER_SIGNS])}) = ${numberKey(typed)}`;
}

function without(text: SQL, signs: readonly string[]): SQL {
	return signs.reduce((rest, sign) => sql`replace(${rest}, ${sign}, '')`, text);
}
