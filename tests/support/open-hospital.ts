import { afterAll } from 'vitest';
import { freshDatabase } from './database';
import { testEnvironment } from './environment';
import { makeHospital, type Hospital } from './hospital';

/**
 * The small hospital in a database of its own, for one test file: `const hospital = await openHospital();` at its top.
 * Both are taken away after the file's tests.
 *
 * @param environment variables that the code under test reads; left out where it reads none
 */
export async function openHospital(environment?: Record<string, string>): Promise<Hospital> {
	const variables = environment && testEnvironment(environment);
	const database = await freshDatabase();
	afterAll(() => {
		database.close();
		variables?.remove();
	});
	return makeHospital();
}
