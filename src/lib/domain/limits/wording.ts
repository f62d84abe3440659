/** Between the form of an activity and its entry: lines are rows of a text, a span is two numbers. */
import { activityByCode } from '../bedside/activities/activities';
import type { Activity, Span } from '../bedside/activities/activity';
import type { LocalLines } from '../bedside/activities/local';
import { spanOf, type WordActivityFields } from './page-forms';
import { rowsOf } from './rows';

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

/** The entry from the form. A span of which one end is empty is that one figure; checked by `wordActivityForm`. */
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

function spanFields<N extends 'minutes' | 'repetitions' | 'timesADay'>(name: N, span: Span | null) {
	const [from, to] = span?.map(String) ?? ['', ''];
	return { [`${name}From`]: from, [`${name}To`]: to } as Record<`${N}From` | `${N}To`, string>;
}
