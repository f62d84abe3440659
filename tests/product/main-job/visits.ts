import { INSTANT, SOME, type Call } from './call';
import { MONTH_MS, VISIT, WHY, type Makers } from './makers';

const MOVE = { startsAt: new Date(Date.now() + 2 * MONTH_MS).toISOString() };
const SERIES = {
	from: MOVE.startsAt.slice(0, 10),
	weekdays: ['mon', 'wed', 'fri'],
	time: '16:00',
	count: 2,
	minutes: 45,
	place: 'East Gym'
};
const SERIES_LINE = { id: SOME, startsAt: INSTANT, minutes: 45, place: 'East Gym', state: 'planned' };

export function visitCalls(make: Makers): Call[] {
	const on = (deed: string, state: 'planned' | 'cancelled') => async () =>
		`/api/visits/${await make.visit(state)}/${deed}`;
	const deed = (name: string, state: string, more: object = {}): Call => ({
		name: `${name} a visit`,
		by: 'coordinator',
		path: on(name, 'planned'),
		body: {},
		answer: { status: 200, body: { id: SOME, state, ...more } },
		other: WHY,
		wrong: on(name, 'cancelled')
	});
	return [
		{
			name: 'book a visit',
			by: 'coordinator',
			path: async () => `/api/episodes/${await make.episode()}/visits`,
			body: VISIT,
			answer: { status: 201, body: { items: [{ id: SOME, ...VISIT, state: 'planned' }] } },
			other: { ...VISIT, minutes: 30 },
			wrong: null
		},
		deed('confirm', 'confirmed'),
		deed('cancel', 'cancelled', { told: [] }),
		deed('attend', 'attended'),
		deed('miss', 'missed'),
		{
			name: 'move a visit',
			by: 'coordinator',
			path: on('move', 'planned'),
			body: MOVE,
			answer: { status: 200, body: { id: SOME, ...VISIT, ...MOVE, state: 'planned', sequence: 1, told: [] } },
			other: { ...MOVE, minutes: 30 },
			bad: { startsAt: 'tomorrow' },
			wrong: on('move', 'cancelled')
		},
		{
			name: 'book a series',
			by: 'coordinator',
			path: async () => `/api/episodes/${await make.episode()}/visits`,
			body: { series: SERIES },
			answer: { status: 201, body: { items: [SERIES_LINE, SERIES_LINE] } },
			other: { series: { ...SERIES, count: 3 } },
			bad: { series: { ...SERIES, count: 61 } },
			wrong: null
		}
	];
}
