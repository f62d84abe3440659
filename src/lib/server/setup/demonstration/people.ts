import type { Post, Role } from '$lib/domain/core/codes';

/** Everybody's password in the demonstration. It is no secret: the front page shows it. */
export const DEMO_PASSWORD = 'ropewalk-demo';

export interface DemoUnit {
	name: string;
	kind: 'intensive-care' | 'ward' | 'gym';
}

export const UNITS = [
	{ name: 'Heron Unit', kind: 'intensive-care' },
	{ name: 'Tern Ward', kind: 'ward' },
	{ name: 'East Gym', kind: 'gym' }
] as const satisfies readonly DemoUnit[];
export type UnitName = (typeof UNITS)[number]['name'];

export interface DemoPerson {
	/** The part of the address before `@saltmarsh.example`. */
	signIn: string;
	name: string;
	role: Role;
	phone: string;
	/** Goes beyond the cautious figure, and signs for juniors. */
	senior?: boolean;
}

/** The invented staff. The first eight are named in the README and on the front page. */
export const PEOPLE = {
	surgeon: { signIn: 'surgeon', name: 'Hilde Castellane', role: 'surgeon', phone: '+353861000001' },
	physician: { signIn: 'physician', name: 'Marta Lisowska', role: 'physician', phone: '+353861000002' },
	nurse: { signIn: 'nurse', name: 'Rona Ferris', role: 'nurse', phone: '+353861000003' },
	nurse2: { signIn: 'nurse2', name: 'Desmond Quaye', role: 'nurse', phone: '+353861000004' },
	therapist: {
		signIn: 'therapist',
		name: 'Ivo Aldous',
		role: 'therapist',
		phone: '+353861000005',
		senior: true
	},
	speech: { signIn: 'speech', name: 'Noor Brandreth', role: 'speech-therapist', phone: '+353861000006' },
	coordinator: { signIn: 'coordinator', name: 'Petra Sandoval', role: 'coordinator', phone: '+353861000007' },
	admin: { signIn: 'admin', name: 'Lorcan Whitby', role: 'admin', phone: '+353861000008' },
	surgeon2: { signIn: 'anselm.okoro', name: 'Anselm Okoro', role: 'surgeon', phone: '+353861000009' },
	physician2: { signIn: 'judit.hale', name: 'Judit Hale', role: 'physician', phone: '+353861000010' },
	nurse3: { signIn: 'bram.tolliver', name: 'Bram Tolliver', role: 'nurse', phone: '+353861000011' },
	therapist2: {
		signIn: 'sefa.moran',
		name: 'Sefa Moran',
		role: 'therapist',
		phone: '+353861000012',
		senior: true
	}
} as const satisfies Record<string, DemoPerson>;
export type PersonKey = keyof typeof PEOPLE;

export function emailOf(key: PersonKey): string {
	return `${PEOPLE[key].signIn}@saltmarsh.example`;
}

/** Who answers for each post, day and night on every unit. */
export const COVER: Record<Post, PersonKey> = {
	nurse: 'nurse',
	'nurse-in-charge': 'nurse2',
	physician: 'physician',
	surgeon: 'surgeon'
};

/** Those whom the front page names, in the order of the main job. */
export const SHOWN = [
	'surgeon',
	'therapist',
	'nurse',
	'nurse2',
	'physician',
	'speech',
	'coordinator',
	'admin'
] as const satisfies readonly PersonKey[];
export type ShownKey = (typeof SHOWN)[number];
