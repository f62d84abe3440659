import { connect } from 'node:net';
import { sql } from 'drizzle-orm';
import { db, isDatabaseOpen } from './db';
import { env } from './env';

const PATIENCE_MS = 1_000;

/** What stands in the way of serving; empty when nothing does. In a demonstration the fakes must listen too. */
export async function readiness(): Promise<string[]> {
	const checks: Promise<string | null>[] = [databaseAnswers()];
	if (env().demo) {
		const { sms, mail, smtp } = env().fakes;
		checks.push(listens('SMS fake', sms), listens('mail fake', mail), listens('SMTP fake', smtp));
	}
	return (await Promise.all(checks)).filter((reason) => reason !== null);
}

async function databaseAnswers(): Promise<string | null> {
	if (!isDatabaseOpen()) {
		return 'The database is not open.';
	}
	try {
		await db().get(sql`select 1`);
		return null;
	} catch {
		return 'The database does not answer.';
	}
}

function listens(what: string, port: number): Promise<string | null> {
	return new Promise((resolve) => {
		const socket = connect({ host: '127.0.0.1', port, timeout: PATIENCE_MS });
		const end = (reason: string | null) => {
			socket.destroy();
			resolve(reason);
		};
		socket.once('connect', () => end(null));
		socket.once('error', () => end(`The ${what} does not listen on port ${port}.`));
		socket.once('timeout', () => end(`The ${what} does not answer on port ${port}.`));
	});
}
