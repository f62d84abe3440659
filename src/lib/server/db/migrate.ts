import { readFileSync } from 'node:fs';
import path from 'node:path';
import { sql } from 'drizzle-orm';
import { migrate } from 'drizzle-orm/libsql/migrator';
import type { Db } from './index';

interface Journal {
	entries: { idx: number; when: number; tag: string }[];
}

/**
 * Bring the database to the newest schema and check that nothing was left out.
 * @param folder the folder with the generated SQL and its journal
 * @throws Error when the journal is out of order, a migration was skipped, or the database is newer than this program
 */
export async function migrateDatabase(db: Db, folder = path.resolve('drizzle')): Promise<void> {
	const journal = readJournal(folder);
	checkJournal(journal);
	await refuseNewerDatabase(db, journal);
	await migrate(db, { migrationsFolder: folder });
	const applied = await countApplied(db);
	if (applied !== journal.entries.length) {
		throw new Error(
			`The journal lists ${journal.entries.length} migrations but ${applied} were applied. ` +
				'One was skipped: its timestamp is older than one already applied.'
		);
	}
}

/**
 * The migrator runs only what is newer than the last applied one and skips the rest without a word, so a
 * merged branch with an older timestamp would never run.
 */
export function checkJournal(journal: Journal): void {
	journal.entries.forEach((entry, index) => {
		const before = journal.entries[index - 1];
		if (before && entry.when <= before.when) {
			throw new Error(`Migration ${entry.tag} is not newer than ${before.tag}: generate it again.`);
		}
	});
}

function readJournal(folder: string): Journal {
	const file = path.join(folder, 'meta', '_journal.json');
	return JSON.parse(readFileSync(file, 'utf8')) as Journal;
}

async function refuseNewerDatabase(db: Db, journal: Journal): Promise<void> {
	const table = await db.all(sql`select name from sqlite_master where name = '__drizzle_migrations'`);
	if (table.length === 0) {
		return;
	}
	const applied = await countApplied(db);
	if (applied > journal.entries.length) {
		throw new Error(
			`The database has ${applied} migrations, this program knows ${journal.entries.length}: it is older than its data.`
		);
	}
}

async function countApplied(db: Db): Promise<number> {
	const [row] = await db.all<{ n: number }>(sql`select count(*) as n from __drizzle_migrations`);
	return row?.n ?? 0;
}
