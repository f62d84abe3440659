import { describe, expect, it } from 'vitest';
import { ZodObject, type ZodType } from 'zod';
import {
	createAccountBody,
	createTokenBody,
	createUnitBody,
	firstAdminBody
} from '$lib/domain/accounts/forms';
import { amendSessionBody } from '$lib/domain/bedside/amendments';
import { informBody, passBody, withdrawBody } from '$lib/domain/escalations/forms';
import { reopenBody } from '$lib/domain/visits/forms';

/** Every schema that a page checks a form with: by its name, and the bodies that serve as forms, too. */
function forms(): [string, ZodObject][] {
	const modules = import.meta.glob<Record<string, unknown>>(
		[
			'/src/lib/domain/**/*form*.ts',
			'/src/lib/components/**/*forms.ts',
			'/src/routes/style/form/schema.ts',
			'!**/*.test.ts'
		],
		{ eager: true }
	);
	const named = Object.values(modules)
		.flatMap((module) => Object.entries(module))
		.filter((entry): entry is [string, ZodObject] => /Form$/.test(entry[0]) && entry[1] instanceof ZodObject);
	return [
		...named,
		...Object.entries({ createAccountBody, createTokenBody, createUnitBody, firstAdminBody }),
		...Object.entries({ passBody, informBody, withdrawBody, reopenBody, amendSessionBody })
	];
}

/** What a page may post into any field: nothing, a word of no list, too much, lines of it, no number, no day. */
const POSTED = [
	'',
	'  ',
	'none of these',
	'1e',
	'31 2 2026',
	'x'.repeat(30_000),
	'x\n'.repeat(15_000),
	'\u0007'
];

/** Fields that nobody types: a page's own program fills them in, or they are boxes to tick. */
const NOT_TYPED = [
	'toldInPerson',
	'sessionId',
	'threadId',
	'neededInMinutes',
	'etaMinutes',
	'shown',
	'language',
	'kind',
	'weekdays',
	'units'
];

interface Said {
	where: string;
	typed: string;
	tooLong: boolean;
	message: string;
}

function said(): Said[] {
	return forms().flatMap(([name, { shape }]) =>
		Object.entries(shape)
			.filter(([field]) => !NOT_TYPED.includes(field))
			.flatMap(([field, schema]) =>
				POSTED.flatMap((typed) => {
					const issues = (schema as ZodType).safeParse(typed).error?.issues ?? [];
					return issues.map((issue) => ({
						where: `${name}.${field}`,
						typed,
						tooLong: issue.code === 'too_big' && issue.origin === 'string',
						message: issue.message
					}));
				})
			)
	);
}

/** Boxes and lists of boxes get no text from a page. */
const NO_TEXT = /^Invalid input: expected (boolean|array)/;

/** Whether a sentence begins like one, holds no name of the code, and is none of the library's own. */
function byWords({ message }: Said): boolean {
	// What was typed is repeated as it was, between its marks.
	const own = message.replace(/“[^”]*”|'[^']*'/g, '');
	return (
		/^\p{Lu}/u.test(own) &&
		!/\b[a-z]+[A-Z]\w*\b/.test(own) &&
		!/^(Invalid|Too (big|small)|Unrecognized)/.test(own)
	);
}

const SAID = said();

/** Fields that a page fills in by itself, and the page of parts, which has labels of its own. */
const BY_PROGRAM = [
	'questionForm.',
	'giveForm.seen',
	'refuseForm.seen',
	'wordActivityForm.code',
	'resetActivityForm.code',
	'idForm.id'
];

/** All words of the screens. */
function catalogue(): string[] {
	const files = import.meta.glob<Record<string, unknown>>('/src/lib/i18n/messages/en/*.json', {
		eager: true,
		import: 'default'
	});
	return Object.values(files)
		.flatMap((file) => Object.values(file))
		.filter((words) => typeof words === 'string');
}

/** What follows these words at the start of a sentence; nothing where it begins otherwise. */
const after = (sentence: string, start: string) =>
	sentence.startsWith(start) ? sentence.slice(start.length) : '';

const lowered = (label: string) => label.charAt(0).toLowerCase() + label.slice(1);

const lineOf = ({ where, message }: Said) => `${where}: ${message}`;

describe('what forms say', () => {
	it('is looked at in all of them', () => {
		expect(forms().length).toBeGreaterThan(20);
		expect(SAID.length).toBeGreaterThan(100);
	});

	it.each(['agreedBy is empty.', 'note is empty.', 'Clinical lead: agreedBy is empty.', 'Invalid input'])(
		'is not by words: %s',
		(message) => {
			expect(byWords({ where: '', typed: '', tooLong: false, message })).toBe(false);
		}
	);

	it('names a field by words, never by its key', () => {
		const wrong = SAID.filter((each) => !NO_TEXT.test(each.message) && !byWords(each));
		expect(wrong.map(lineOf)).toEqual([]);
	});

	it('names it by the words of its label', () => {
		const labels = catalogue().filter((words) => words.length < 60 && !/[.?{]/.test(words));
		const begins = ({ message }: Said) =>
			labels.some(
				(label) => message.startsWith(label) || /^[ :]/.test(after(message, `The ${lowered(label)}`))
			);
		const own = (each: Said) =>
			!NO_TEXT.test(each.message) && !BY_PROGRAM.some((start) => each.where.startsWith(start));
		expect(SAID.filter((each) => own(each) && !begins(each)).map(lineOf)).toEqual([]);
	});

	it('repeats what is no day, no time, no number and no address', () => {
		const read = SAID.filter(
			({ where, typed }) => ['31 2 2026', '1e'].includes(typed) && /(Date|On|Time|\.time|email)$/.test(where)
		);
		expect(read.length).toBeGreaterThan(10);
		expect(read.filter(({ message, typed }) => !message.includes(`“${typed}”`)).map(lineOf)).toEqual([]);
	});

	it('tells of a text that is too long how long it is, and the limit', () => {
		const long = SAID.filter(({ tooLong }) => tooLong);
		expect(long.length).toBeGreaterThan(20);
		const wrong = long.filter(({ message, typed }) => {
			const told = /has (\d+) characters, and the limit is \d+\.$/.exec(message)?.[1];
			// Most texts are counted without the blanks at their ends.
			return ![typed.length, typed.trim().length].includes(Number(told));
		});
		expect(wrong.map(lineOf)).toEqual([]);
	});
});
