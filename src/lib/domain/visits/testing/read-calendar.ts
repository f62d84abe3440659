/** Calendar files as others read them, for tests. */
import ICAL from 'ical.js';
import ical from 'node-ical';

/** What a parser read, as far as both tell it. */
export interface Read {
	uid: string;
	sequence: number;
	start: number;
	end: number;
	summary: string;
	location: string;
	description: string;
	status: string;
}

export function readByIcalJs(file: string): { method: string; events: Read[] } {
	const calendar = new ICAL.Component(ICAL.parse(file) as unknown as [string, object[], object[]]);
	const events = calendar.getAllSubcomponents('vevent').map((component) => {
		const event = new ICAL.Event(component);
		return {
			uid: event.uid,
			sequence: Number(event.sequence),
			start: event.startDate.toJSDate().getTime(),
			end: event.endDate.toJSDate().getTime(),
			summary: event.summary,
			location: event.location,
			description: event.description,
			status: String(component.getFirstPropertyValue('status'))
		};
	});
	return { method: String(calendar.getFirstPropertyValue('method')), events };
}

export function readByNodeIcal(file: string): { method: string; events: Read[] } {
	const parsed = ical.sync.parseICS(file);
	const events = Object.values(parsed).flatMap((one) =>
		one?.type === 'VEVENT'
			? [
					{
						uid: one.uid,
						sequence: Number(one.sequence),
						start: one.start.getTime(),
						end: one.end?.getTime() ?? NaN,
						summary: String(one.summary),
						location: String(one.location),
						description: String(one.description),
						status: String(one.status)
					}
				]
			: []
	);
	const method = String((parsed.vcalendar as { method?: string } | undefined)?.method);
	return { method, events };
}

/** Two parsers that know nothing of each other or of us. */
export const PARSERS = [
	['ical.js', readByIcalJs],
	['node-ical', readByNodeIcal]
] as const;
