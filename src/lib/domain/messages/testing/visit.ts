/** A visit of the invented hospital, with all that a message to its patient may tell: what tests start from. */
export const VISIT = {
	sender: 'Saltmarsh General',
	phone: '+353 1 555 0100',
	startsAt: Date.parse('2025-03-28T10:00:00Z'),
	zone: 'Europe/Dublin',
	place: 'East Gym',
	emergency: '112'
};
