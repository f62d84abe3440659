import { requirePerson } from '$lib/server/context';
import { frameOf } from '$lib/server/frame';
import type { LayoutServerLoad } from './$types';

export const load: LayoutServerLoad = ({ locals }) =>
	frameOf(requirePerson(locals.context), locals.liveCursor);
