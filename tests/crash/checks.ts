import { openDatabase, closeDatabase, db } from '$lib/server/db';
import { verifyAudit } from '$lib/server/audit/verify';
import { sql } from 'drizzle-orm';
import path from 'node:path';
import type { Client } from '../support/api';
import type { Write } from './writers';

/** Every entry of a thread that a reader sees, page by page. */
async function entriesOf(
	client: Client,
	threadId: string
): Promise<{ id: string; seq: number; body: string }[]> {
	const all: { id: string; seq: number; body: string }[] = [];
	let after = '';
	for (;;) {
		const { body } = await client.get(`/api/threads/${threadId}?limit=200${after}`);
		all.push(...(body.items as unknown as typeof all));
		if (body.next === null) {
			return all;
		}
		after = `&after=${String(body.next)}`;
	}
}

/** What must hold of the entries: each answered write is there once, none is there twice, numbers have no gaps. */
export async function checkEntries(client: Client, writes: Write[]): Promise<string[]> {
	const wrong: string[] = [];
	for (const threadId of new Set(writes.map((write) => write.threadId))) {
		const entries = await entriesOf(client, threadId);
		entries.forEach((entry, index) => {
			if (entry.seq !== index + 1) {
				wrong.push(`thread ${threadId}: entry ${index + 1} has the number ${entry.seq}`);
			}
		});
		for (const write of writes.filter((w) => w.threadId === threadId)) {
			const found = entries.filter((entry) => entry.body === write.body);
			if (found.length !== 1 || found[0]?.id !== write.answered) {
				wrong.push(`"${write.body}" answered as ${write.answered} is there ${found.length} times`);
			}
		}
	}
	return wrong;
}

/** What must hold of the file, looked at while the server is stopped. */
export async function checkFile(dataDir: string): Promise<string[]> {
	await openDatabase(`file:${path.join(dataDir, 'ropewalk.db')}`);
	try {
		const wrong: string[] = [];
		const integrity = await db().get<{ integrity_check: string }>(sql`pragma integrity_check`);
		if (integrity?.integrity_check !== 'ok') {
			wrong.push(`integrity_check says ${integrity?.integrity_check}`);
		}
		if ((await db().all(sql`pragma foreign_key_check`)).length > 0) {
			wrong.push('a foreign key points at nothing');
		}
		const chain = await verifyAudit(db());
		if (!chain.intact) {
			wrong.push(`the audit chain breaks at row ${chain.brokenAt}`);
		}
		const lone = await db().get<{ n: number }>(sql`
			select count(*) as n from entries e where e.kind = 'note'
			and not exists (select 1 from audit a where a.object_id = e.id)`);
		if (lone?.n) {
			wrong.push(`${lone.n} entries have no audit row`);
		}
		return wrong;
	} finally {
		closeDatabase();
	}
}
