import { beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { ROLES } from '$lib/domain/core/codes';
import { coverNow, onCover } from '$lib/server/cover/queries';
import { db } from '$lib/server/db';
import { coverShifts } from '$lib/server/db/schema';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { newId } from '$lib/server/ids';
import { at, CALL, messagesOf, toldOf } from '../support/escalations';
import { addPatient, addPerson, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const HOUR = 3600;

const hospital = await openHospital();

beforeEach(async () => {
	await db().delete(coverShifts);
});

const ward = () => hospital.units.ward;
async function cover({ id: userId }: Person, from = -HOUR, until = HOUR): Promise<void> {
	const shift = { id: newId(), unitId: ward(), post: 'nurse' as const, userId };
	await db()
		.insert(coverShifts)
		.values({ ...shift, startsAt: at(from), endsAt: at(until) });
}
const names = async () => ({
	chain: (await onCover(db(), ward(), 'nurse', at(0))).map(({ name }) => name),
	shell: (await coverNow(db(), [ward()], at(0))).map(({ name }) => name)
});

describe('who answers for a post', () => {
	it.each(ROLES)('a %s, as far as the role takes calls', async (role) => {
		const person = hospital.people[role];
		await cover(person);
		const found = ['nurse', 'physician', 'surgeon'].includes(role) ? [person.name] : [];
		expect(await names()).toEqual({ chain: found, shell: found });
	});

	it.each([
		['somebody of the unit', () => ({ unitIds: [ward()] }), true],
		['somebody of another unit', () => ({ unitIds: [hospital.units.gym] }), false],
		['somebody of no unit', () => ({ unitIds: [] }), false],
		['a disabled account', () => ({ unitIds: [ward()], disabledAt: at(-1) }), false]
	])('%s', async (_, given, counts) => {
		const person = await addPerson({ role: 'nurse', ...given() });
		await cover(person);
		const found = counts ? [person.name] : [];
		expect(await names()).toEqual({ chain: found, shell: found });
	});

	it.each([
		['that begins now', 0, HOUR, true],
		['that begins in a second', 1, HOUR, false],
		['that ends in a second', -HOUR, 1, true],
		['that ends now', -HOUR, 0, false]
	])('in a shift %s', async (_, from, until, counts) => {
		await cover(hospital.people.nurse, from, until);
		expect((await names()).chain).toHaveLength(counts ? 1 : 0);
	});
});

describe('a post whose person could not take the call', () => {
	it('counts as nobody: no message goes to them, and the chain goes on at once', async () => {
		const elsewhere = await addPerson({ role: 'nurse', unitIds: [hospital.units.gym] });
		await cover(elsewhere);
		const { physician, therapist } = hospital.people;
		const shift = { id: newId(), unitId: ward(), post: 'physician' as const, userId: physician.id };
		await db()
			.insert(coverShifts)
			.values({ ...shift, startsAt: at(-HOUR), endsAt: at(HOUR) });
		const { episodeId } = await addPatient({ unitId: ward() });
		const { id } = (await raiseEscalation(contextOf(therapist, at(0)), episodeId, CALL)).result;
		expect((await messagesOf(id)).map(({ userId }) => userId)).toEqual([physician.id]);
		expect((await toldOf(id)).slice(0, 2)).toEqual(['0:nurse (nobody)', '0:nurse-in-charge (nobody)']);
	});
});
