import { afterAll, beforeAll, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { patients } from '$lib/server/db/schema';
import { safeError } from '$lib/server/log';
import { freshDatabase } from '../support/database';

let close: () => void;
beforeAll(async () => {
	({ close } = await freshDatabase());
});
afterAll(() => close());

it('logs a failed query by kind, code and place, without a word of its parameters', async () => {
	const row = {
		id: 'p1',
		name: 'Orla Penhale',
		mrn: 'SG-1',
		birthDate: '1951-03-12',
		sex: 'female' as const,
		phone: '+353861234567',
		zone: 'Europe/Dublin',
		createdAt: 1
	};
	await db().insert(patients).values(row);
	const error: unknown = await db()
		.insert(patients)
		.values(row)
		.catch((thrown: unknown) => thrown);
	const logged = JSON.stringify(safeError(error));
	expect(logged).toContain('SQLITE_CONSTRAINT');
	expect(logged).not.toMatch(/Penhale|353861234567|1951|SG-1|insert into/i);
});

it('logs what is no error by its type alone', () => {
	expect(safeError('Orla Penhale')).toBe('string');
});
