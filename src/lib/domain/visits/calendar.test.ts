import { describe, expect, it } from 'vitest';
import { deniedWords } from '../messages/deny-list';
import { calendarFile, calendarId, methodOf, type CalendarFrame, type CalendarVisit } from './calendar';
import { PARSERS, readByIcalJs, readByNodeIcal } from './testing/read-calendar';
import { escapeText, folded, quoted, utcStamp } from './calendar-text';

const utc = (text: string) => Date.parse(text);

const VISIT: CalendarVisit = {
	id: '0198a',
	sequence: 0,
	startsAt: utc('2025-03-31T09:00:00Z'),
	minutes: 45,
	place: 'East Gym'
};
const FRAME: CalendarFrame = {
	method: 'REQUEST',
	now: utc('2025-03-01T08:30:00Z'),
	sender: 'Saltmarsh General',
	phone: '+353 1 555 0100',
	language: 'en',
	organizer: 'ropewalk@saltmarsh.example',
	attendee: 'pat@post.example'
};

describe('a calendar file', () => {
	it('is written letter for letter', () => {
		expect(calendarFile([VISIT], FRAME).split('\r\n')).toEqual([
			'BEGIN:VCALENDAR',
			'VERSION:2.0',
			'PRODID:-//Ropewalk//Visits//EN',
			'CALSCALE:GREGORIAN',
			'METHOD:REQUEST',
			'BEGIN:VEVENT',
			'UID:visit-0198a@ropewalk',
			'DTSTAMP:20250301T083000Z',
			'SEQUENCE:0',
			'DTSTART:20250331T090000Z',
			'DTEND:20250331T094500Z',
			'SUMMARY:Visit\\, Saltmarsh General',
			'LOCATION:East Gym',
			'DESCRIPTION:To change it\\, or if you cannot come\\, call +353 1 555 0100.',
			'STATUS:CONFIRMED',
			'ORGANIZER;CN="Saltmarsh General":mailto:ropewalk@saltmarsh.example',
			'ATTENDEE;ROLE=REQ-PARTICIPANT;PARTSTAT=NEEDS-ACTION;RSVP=FALSE:mailto:pat@p',
			' ost.example',
			'TRANSP:OPAQUE',
			'END:VEVENT',
			'END:VCALENDAR',
			''
		]);
	});

	describe.each(PARSERS)('read back by %s', (_, read) => {
		it('a request, in summer time', () => {
			expect(read(calendarFile([VISIT], FRAME))).toEqual({
				method: 'REQUEST',
				events: [
					{
						uid: 'visit-0198a@ropewalk',
						sequence: 0,
						start: utc('2025-03-31T09:00:00Z'),
						end: utc('2025-03-31T09:45:00Z'),
						summary: 'Visit, Saltmarsh General',
						location: 'East Gym',
						description: 'To change it, or if you cannot come, call +353 1 555 0100.',
						status: 'CONFIRMED'
					}
				]
			});
		});

		it('a move keeps the identifier and raises the sequence; a cancellation says so', () => {
			const moved = { ...VISIT, sequence: 1, startsAt: utc('2025-04-02T09:00:00Z') };
			const [event] = read(calendarFile([moved], FRAME)).events;
			expect(event).toMatchObject({ uid: calendarId('0198a'), sequence: 1, start: moved.startsAt });
			const cancelled = read(calendarFile([{ ...moved, sequence: 2 }], { ...FRAME, method: 'CANCEL' }));
			expect(cancelled.method).toBe('CANCEL');
			expect(cancelled.events).toEqual([
				expect.objectContaining({ uid: calendarId('0198a'), sequence: 2, status: 'CANCELLED' })
			]);
		});

		it('a series, in Spanish, with an accent in the place', () => {
			const visits = [1, 2, 3].map((n) => ({
				...VISIT,
				id: `v${n}`,
				startsAt: VISIT.startsAt + n * 86_400_000
			}));
			const file = calendarFile(visits, { ...FRAME, method: 'PUBLISH', attendee: null, language: 'es' });
			const { method, events } = read(file);
			expect(method).toBe('PUBLISH');
			expect(events.map(({ uid, start }) => [uid, start])).toEqual(
				visits.map(({ id, startsAt }) => [calendarId(id), startsAt])
			);
			expect(events[0]?.summary).toBe('Cita, Saltmarsh General');
		});
	});

	it('asks about one visit at a time', () => {
		expect(() => calendarFile([VISIT, VISIT], FRAME)).toThrow('about one visit, not 2');
	});

	it('a hospital called after what it treats is not named', () => {
		const file = calendarFile([{ ...VISIT, place: 'Cardiac Gym' }], { ...FRAME, sender: 'Heart Centre' });
		expect(deniedWords(file)).toEqual([]);
		expect(file).toContain('LOCATION:the usual place');
	});

	it.each(['REQUEST', 'CANCEL', 'PUBLISH'] as const)('states its method: %s', (method) => {
		expect(methodOf(calendarFile([VISIT], { ...FRAME, method }))).toBe(method);
	});

	it('of another text the method is not known', () => {
		expect(methodOf('METHOD:REFRESH\r\n')).toBeNull();
	});
});

const octets = (line: string) => new TextEncoder().encode(line).length;
const tooLong = (file: string) => file.split('\r\n').filter((line) => octets(line) > 75);

describe('the letter', () => {
	it.each([
		['a;b,c\\d', 'a\\;b\\,c\\\\d'],
		['one\r\ntwo\nthree\rfour', 'one\\ntwo\\nthree\\nfour'],
		['bell\u0007', 'bell ']
	])('%j is escaped', (text, expected) => {
		expect(escapeText(text)).toBe(expected);
	});

	it('a name in quotation marks holds none', () => {
		expect(quoted('The "Old"\r\nHarbour')).toBe('"The  Old   Harbour"');
	});

	it('an instant has no milliseconds', () => {
		expect(utcStamp(utc('2025-03-28T10:00:07.900Z'))).toBe('20250328T100007Z');
	});

	it.each([
		['74 letters', 'x'.repeat(74), 1],
		['75 letters', 'x'.repeat(75), 1],
		['76 letters', 'x'.repeat(76), 2],
		['two octets at the edge', `${'x'.repeat(74)}é`, 2],
		['four octets over the edge', `${'x'.repeat(72)}🌊`, 2],
		['a long line', 'é'.repeat(200), 6]
	])('%s', (_, line, parts) => {
		const file = folded(line);
		expect(file.split('\r\n')).toHaveLength(parts);
		expect(tooLong(file)).toEqual([]);
		expect(file.replaceAll('\r\n ', '')).toBe(line);
	});
});

describe('a file that publishes several', () => {
	it('marks those that are cancelled, and frees their hours', () => {
		const file = calendarFile([VISIT, { ...VISIT, id: '0198b', cancelled: true }], {
			...FRAME,
			method: 'PUBLISH',
			attendee: null
		});
		for (const { events } of [readByIcalJs(file), readByNodeIcal(file)]) {
			expect(events.map(({ uid, status }) => [uid, status])).toEqual([
				[calendarId('0198a'), 'CONFIRMED'],
				[calendarId('0198b'), 'CANCELLED']
			]);
		}
		expect(file.match(/TRANSP:\w+/g)).toEqual(['TRANSP:OPAQUE', 'TRANSP:TRANSPARENT']);
	});

	it.each(['PUBLISH', 'REQUEST', 'CANCEL'] as const)('is none without a visit (%s)', (method) => {
		expect(() => calendarFile([], { ...FRAME, method })).toThrow(RangeError);
	});
});
