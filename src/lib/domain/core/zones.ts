/** The time zones that a person can choose from, as places: nobody has to know their names. */
import type { Zone } from './time';

export interface ZonePlace {
	readonly zone: Zone;
	/** `Buenos Aires (Argentina)` of `America/Argentina/Buenos_Aires`. */
	readonly place: string;
}

/** The places of one part of the world, such as `Europe`. */
export interface ZoneGroup {
	readonly region: string;
	readonly places: readonly ZonePlace[];
}

/**
 * All zones that this machine knows, by part of the world and by place.
 * @param onRecord zones that must be among them, whatever the machine lists: its list leaves out names that it knows
 */
export function zoneGroups(...onRecord: Zone[]): ZoneGroup[] {
	const groups = new Map<string, ZonePlace[]>();
	for (const zone of new Set([...Intl.supportedValuesOf('timeZone'), ...onRecord])) {
		const region = zone.split('/')[0] ?? zone;
		groups.set(region, [...(groups.get(region) ?? []), { zone, place: placeOf(zone) }]);
	}
	return [...groups]
		.map(([region, places]) => ({ region, places: places.sort((a, b) => compare(a.place, b.place)) }))
		.sort((a, b) => compare(a.region, b.region));
}

/** A zone as a place: its town, and where there are several of the name, of which country. */
export function placeOf(zone: Zone): string {
	const [region = zone, ...rest] = zone.replaceAll('_', ' ').split('/');
	const town = rest.pop() ?? region;
	return rest.length === 0 ? town : `${town} (${rest.join(', ')})`;
}

function compare(a: string, b: string): number {
	return a < b ? -1 : Number(a > b);
}
