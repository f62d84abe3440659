import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { closeDatabase, openDatabase, type Db } from '$lib/server/db';
import { migrateDatabase } from '$lib/server/db/migrate';

/** A fresh, migrated database on a real file. Call `close` when the test file is done. */
export async function freshDatabase(): Promise<{ db: Db; file: string; close(): void }> {
	const folder = mkdtempSync(path.join(tmpdir(), 'ropewalk-'));
	const file = path.join(folder, 'ropewalk.db');
	const db = await openDatabase(`file:${file}`);
	await migrateDatabase(db);
	return {
		db,
		file,
		close() {
			closeDatabase();
			rmSync(folder, { recursive: true, force: true });
		}
	};
}
