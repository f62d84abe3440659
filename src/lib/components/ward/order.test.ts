import { describe, expect, it } from 'vitest';
import { mayDoNow } from '$lib/domain/episodes/may-do-now';
import { precautionsOf } from '$lib/domain/episodes/precautions';
import type { EpisodeListItem } from '$lib/domain/episodes/views';
import { inOrder } from './order';

function row(bed: string | null, name: string, level: 1 | 3 | 5, looseEnds: number, unit = 'Tern Ward') {
	return {
		id: `${unit} ${bed ?? name}`,
		patient: { id: name, name, mrn: '', birthDate: '1958-09-05', sex: 'female' },
		unit,
		unitId: unit,
		bed,
		procedure: null,
		operatedAt: null,
		postOpDay: null,
		level,
		betaBlocked: null,
		looseEnds,
		ends: [],
		phase: 'inpatient',
		mayDoNow: mayDoNow(level, []),
		notKnown: ['operation'],
		precautions: precautionsOf(null, null, false),
		nothingByMouth: false,
		lines: [],
		oxygen: null,
		escalation: null
	} satisfies EpisodeListItem;
}

const ROWS = [
	row('T10', 'Orla', 1, 0),
	row('T2', 'Desmond', 5, 2),
	row('H1', 'Bram', 3, 2, 'Heron Unit'),
	row(null, 'Ayesha', 5, 0, 'East Gym')
];

describe('inOrder', () => {
	it.each([
		[null, 'Bram, Desmond, Orla, Ayesha'],
		[{ by: 'bed', direction: 'ascending' }, 'Bram, Desmond, Orla, Ayesha'],
		[{ by: 'bed', direction: 'descending' }, 'Ayesha, Orla, Desmond, Bram'],
		[{ by: 'patient', direction: 'ascending' }, 'Ayesha, Bram, Desmond, Orla'],
		[{ by: 'patient', direction: 'descending' }, 'Orla, Desmond, Bram, Ayesha'],
		[{ by: 'level', direction: 'ascending' }, 'Orla, Bram, Desmond, Ayesha'],
		[{ by: 'level', direction: 'descending' }, 'Desmond, Ayesha, Bram, Orla'],
		[{ by: 'open', direction: 'descending' }, 'Bram, Desmond, Orla, Ayesha'],
		[{ by: 'nothing known', direction: 'ascending' }, 'Bram, Desmond, Orla, Ayesha']
	] as const)('%j: %s', (sort, names) => {
		const rows = inOrder(ROWS, sort);
		expect(rows.map(({ patient }) => patient.name).join(', ')).toBe(names);
	});

	it('reads the number in a bed as a number', () => {
		const beds = inOrder([row('T10', 'a', 1, 0), row('T9', 'b', 1, 0), row('T2', 'c', 1, 0)], null);
		expect(beds.map(({ bed }) => bed)).toEqual(['T2', 'T9', 'T10']);
	});
});
