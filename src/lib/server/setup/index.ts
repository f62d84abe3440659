import { now } from '../clock';
import { replaceDatabase } from '../db';
import { migrateDatabase } from '../db/migrate';
import { env } from '../env';
import { log } from '../log';
import { loadDemonstration } from './demonstration/load';
import { namePhones } from './demonstration/phones';
import { inviteFirstAdmin, printFirstAdminLink } from './first-admin';
import { kindOfDatabase, type Kind } from './mark';

/**
 * Make a new database usable: the demonstration hospital, or the link of the first administrator.
 * @throws Error when the mode does not fit the database: known sign-ins must never open a hospital's own data, and
 * nobody must take invented patients for real ones
 */
export async function prepareHospital(): Promise<void> {
	const kind = await kindOfDatabase();
	if (env().demo) {
		await prepareDemonstration(kind);
		void namePhones();
		return;
	}
	refuseDemonstration(kind);
	const link = await inviteFirstAdmin(now());
	if (link) {
		printFirstAdminLink(link);
	}
}

async function prepareDemonstration(kind: Kind): Promise<void> {
	switch (kind) {
		case 'demonstration':
			return;
		case 'fresh':
			return loadDemonstration(now());
		case 'own':
			throw new Error(
				`DEMO=1 needs a database that was made as a demonstration; ${env().databaseUrl} was not. ` +
					'Nothing was changed. Choose another DATA_DIR, or start without DEMO=1.'
			);
		case 'unfinished':
			return makeAnew();
	}
}

/**
 * A server that was stopped while it made the demonstration has let nobody in yet: what it leaves is invented, and
 * nothing in it can be completed, because its deeds happened in an order.
 */
async function makeAnew(): Promise<void> {
	log().warn('the making of the demonstration was interrupted; it is made anew');
	await migrateDatabase(await replaceDatabase());
	await loadDemonstration(now());
}

function refuseDemonstration(kind: Kind): void {
	if (kind === 'demonstration' || kind === 'unfinished') {
		throw new Error(
			`The database ${env().databaseUrl} is a demonstration with known passwords and invented patients. ` +
				'Start it with DEMO=1, or choose another DATA_DIR for your own hospital.'
		);
	}
}
