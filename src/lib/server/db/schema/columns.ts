import { integer, text } from 'drizzle-orm/sqlite-core';

/** Column shapes that repeat. Instants are integer milliseconds UTC; identifiers are UUIDv7 text. */
export const id = () => text('id').primaryKey();
export const instant = (name: string) => integer(name, { mode: 'number' });
export const yesNo = (name: string) => integer(name, { mode: 'boolean' });
export const json = <T>(name: string) => text(name, { mode: 'json' }).$type<T>();
