/** Between the form of an activity and its entry: lines are rows of a text, a span is two numbers. */
import { activityByCode } from '../bedside/activities/activities';
import type { Activity, Span } from '../bedside/activities/activity';
import type { LocalLines } from '../bedside/activities/local';
import type { WordActivityFields } from './forms';

type Worded = Omit<WordActivityFields, 'code' | 'agreedBy' | 'agreedOn'>;

/** What the form starts with: the entry as the unit has it now, and of its needs those that the unit added. */
export function fieldsOfLines(activity: LocalLines & Pick<Activity, 'name' | 'code'>): Worded {
	const { name, needs = [], dose, howTo, watch, never } = activity;
	const ofCatalogue = activityByCode(activity.code).needs;
	return {
		name,
		needs: needs.filter((need) => !ofCatalogue.includes(need)).join('\n'),
		words: dose.words,
		...spanFields('minutes', dose.minutes),
		...spanFields('repetitions', dose.repetitions),
		...spanFields('timesADay', dose.timesADay),
		howTo: howTo.join('\n'),
		watch: watch.join('\n'),
		never: never.join('\n')
	};
}

/** The entry from the form. A span of which one end is empty is that one figure; checked by `wordActivityBody`. */
export function linesOfFields(fields: Worded) {
	return {
		name: fields.name,
		needs: rowsOf(fields.needs),
		dose: {
			minutes: spanOf(fields.minutesFrom, fields.minutesTo),
			repetitions: spanOf(fields.repetitionsFrom, fields.repetitionsTo),
			timesADay: spanOf(fields.timesADayFrom, fields.timesADayTo),
			words: fields.words
		},
		howTo: rowsOf(fields.howTo),
		watch: rowsOf(fields.watch),
		never: rowsOf(fields.never)
	};
}

function spanFields(name: 'minutes' | 'repetitions' | 'timesADay', span: Span | null): Partial<Worded> {
	return span === null ? {} : { [`${name}From`]: span[0], [`${name}To`]: span[1] };
}

function spanOf(from: number | undefined, to: number | undefined): [number, number] | null {
	const [low, high] = [from ?? to, to ?? from];
	return low === undefined || high === undefined ? null : [low, high];
}

function rowsOf(text: string): string[] {
	return text
		.split('\n')
		.map((line) => line.trim())
		.filter((line) => line !== '');
}
