import { describe, expect, it } from 'vitest';
import { conflictsWith, type Identity } from './identity';

const KNOWN: Identity = { name: 'Ide Quillfeather', birthDate: '1958-09-05', sex: 'female' };

describe('conflictsWith', () => {
	it.each<[Partial<Identity>, string[], boolean]>([
		[{}, [], false],
		[{ name: ' ide  QUILLFEATHER' }, [], false],
		[{ name: 'Ide Marsh' }, ['/patient/mrn', '/patient/name'], true],
		[{ birthDate: '1958-09-06' }, ['/patient/birthDate'], false],
		[{ sex: 'male' }, ['/patient/sex'], false],
		[{ sex: 'unknown' }, [], false],
		[{ name: 'Ide Marsh', sex: 'unknown' }, ['/patient/mrn', '/patient/name'], true],
		[
			{ name: 'Ide Marsh', birthDate: '1985-09-05' },
			['/patient/mrn', '/patient/name', '/patient/birthDate'],
			false
		],
		[
			{ name: 'Tom Reed', birthDate: '1985-09-05', sex: 'male' },
			['/patient/mrn', '/patient/name', '/patient/birthDate', '/patient/sex'],
			false
		]
	])('%j contradicts the record in %j, to be confirmed: %s', (given, pointers, confirmable) => {
		const found = conflictsWith('S-1', KNOWN, { ...KNOWN, ...given });
		expect(found.errors.map(({ pointer }) => pointer)).toEqual(pointers);
		expect(found.confirmable).toBe(confirmable);
	});

	it('takes a sex that the record does not have', () => {
		expect(conflictsWith('S-1', { ...KNOWN, sex: 'unknown' }, KNOWN).errors).toEqual([]);
	});

	it('asks about the number first when the name is another', () => {
		const { errors } = conflictsWith('S-1', KNOWN, { ...KNOWN, name: 'Ide Marsh' });
		expect(errors.map(({ message }) => message)).toEqual([
			'Hospital number S-1 belongs to Ide Quillfeather, born 1958-09-05. Is it the right number?',
			"The patient's name differs: on record is Ide Quillfeather, not Ide Marsh."
		]);
	});

	it('names the number, what is on record and what was given', () => {
		const { errors } = conflictsWith('S-1', KNOWN, { ...KNOWN, birthDate: '1985-09-05' });
		expect(errors[0]?.message).toBe(
			'The birth date differs: hospital number S-1 is on record with 1958-09-05, not 1985-09-05.'
		);
	});
});
