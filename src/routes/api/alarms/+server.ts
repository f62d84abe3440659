import { reading } from '$lib/server/http/endpoint';
import { read } from '$lib/server/read';

/** The untaken high escalations of one's units: unit, bed, grade and since when, for every role. */
export const GET = reading({
	permission: 'alarm.read',
	run: async (context) => ({ items: await read.alarms(context) })
});
