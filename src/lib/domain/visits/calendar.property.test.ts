import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { deniedWords } from '../messages/deny-list';
import { placeName, senderName } from '../messages/templates/frame';
import { MESSAGE_LANGUAGES } from '../messages/templates/wording';
import { calendarFile, calendarId } from './calendar';
import { PARSERS } from './testing/read-calendar';

const minutes = (text: string) => Date.parse(text) / 60_000;
const words = fc.string({ unit: 'grapheme', maxLength: 80 });
const files = fc.record({
	minute: fc.integer({ min: minutes('2025-01-01'), max: minutes('2030-01-01') }),
	length: fc.integer({ min: 10, max: 240 }),
	sequence: fc.integer({ min: 0, max: 40 }),
	place: fc.oneof(words, fc.constantFrom('East Gym; door 3, left', 'C:\\Gym', 'Two\nlines', 'Cardiac Gym')),
	sender: fc.oneof(words, fc.constantFrom('Saltmarsh General', 'The Heart Centre', 'Old, Harbour; "Inn"')),
	language: fc.constantFrom(...MESSAGE_LANGUAGES)
});

/** What a line can carry of a text: line breaks of one kind, and a space for what has no place in it. */
const carried = (text: string) => text.replace(/\r\n|\r/g, '\n').replace(/[^\P{Cc}\n]/gu, ' ');
const octets = (line: string) => new TextEncoder().encode(line).length;

describe.each(PARSERS)('property: read back by %s', (_, read) => {
	it('instants and words arrive as they were written, whatever hospital and place are called', () => {
		fc.assert(
			fc.property(files, ({ minute, length, sequence, place, sender, language }) => {
				const visit = { id: 'v', startsAt: minute * 60_000, minutes: length, sequence, place };
				const file = calendarFile([visit], {
					method: 'REQUEST',
					now: 0,
					sender,
					phone: '+353 1 555 0100',
					language,
					organizer: 'ropewalk@saltmarsh.example',
					attendee: 'pat@post.example'
				});
				const { method, events } = read(file);
				const [visitWord, call] = {
					en: ['Visit, ', 'To change it, or if you cannot come, call +353 1 555 0100.'],
					es: ['Cita, ', 'Para cambiarla o si no puede venir, llame al +353 1 555 0100.']
				}[language];
				expect(method).toBe('REQUEST');
				expect(events).toEqual([
					{
						uid: calendarId('v'),
						sequence,
						start: visit.startsAt,
						end: visit.startsAt + length * 60_000,
						summary: carried(visitWord + senderName({ sender }, language)),
						location: carried(placeName(visit, language)),
						description: call,
						status: 'CONFIRMED'
					}
				]);
				expect(file.split('\r\n').filter((line) => octets(line) > 75)).toEqual([]);
				expect(deniedWords(`${events[0]?.summary} ${events[0]?.location}`)).toEqual([]);
			}),
			{ numRuns: 300 }
		);
	});
});
