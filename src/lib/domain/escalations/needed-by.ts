/**
 * When something is due that hurries a call on: as planned, or when it is needed by where that comes sooner. Once
 * that moment has passed it hurries nothing any more, and the plan holds. Common practice, no published source.
 * @param planned milliseconds UTC
 * @param neededBy what the caller said, milliseconds UTC; null where they said nothing
 */
export function hurried(planned: number, neededBy: number | null, now: number): number {
	return neededBy !== null && neededBy > now ? Math.min(planned, neededBy) : planned;
}
