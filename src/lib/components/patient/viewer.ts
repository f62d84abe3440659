import type { Person } from '$lib/domain/access/actor';
import type { Role } from '$lib/domain/core/codes';

interface Frame {
	user: { id: string; name: string; role: Role; senior?: boolean };
	units: readonly { id: string }[];
}

/** The person who looks at a page, to ask `can()` which deeds to show. The server decides anyway. */
export function viewerOf({ user, units }: Frame): Person {
	return { kind: 'person', ...user, unitIds: units.map(({ id }) => id) };
}
