import { POSTS, type Post } from '$lib/domain/core/codes';

/** Somebody on cover, and when the shift ends, milliseconds UTC. */
export interface CoverShift {
	unitId: string;
	post: Post;
	name: string;
	until: number;
}

export interface PostOnCover {
	post: Post;
	/** Those whose shift has not ended; more than one may share a post. */
	people: { name: string; until: number }[];
}

export interface UnitOnCover {
	id: string;
	name: string;
	posts: PostOnCover[];
}

/** Every post of every unit, filled or not: a gap is a row like the others. */
export function coverByUnit(
	units: readonly { id: string; name: string }[],
	shifts: readonly CoverShift[],
	now: number
): UnitOnCover[] {
	const running = shifts.filter(({ until }) => until > now);
	return units.map(({ id, name }) => ({
		id,
		name,
		posts: POSTS.map((post) => ({
			post,
			people: running
				.filter((shift) => shift.unitId === id && shift.post === post)
				.map((shift) => ({ name: shift.name, until: shift.until }))
		}))
	}));
}

/** How many posts nobody answers for. */
export function gapsIn(units: readonly UnitOnCover[]): number {
	return units.flatMap(({ posts }) => posts).filter(({ people }) => people.length === 0).length;
}
