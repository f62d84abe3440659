import { asc } from 'drizzle-orm';
import type { Reader } from '../db';
import { audit } from '../db/schema';
import { CHAIN_START, hashRow } from './append';

export type ChainVerdict = { intact: true; rows: number; head: string } | { intact: false; brokenAt: number };

/** Walk the audit chain and say where it breaks: an edited, missing or swapped row shows at its number. */
export async function verifyAudit(db: Reader): Promise<ChainVerdict> {
	const rows = await db.select().from(audit).orderBy(asc(audit.seq));
	let prev = CHAIN_START;
	for (const [index, { hash, ...row }] of rows.entries()) {
		if (row.seq !== index + 1 || row.prev !== prev || hashRow(row) !== hash) {
			return { intact: false, brokenAt: index + 1 };
		}
		prev = hash;
	}
	return { intact: true, rows: rows.length, head: prev };
}
