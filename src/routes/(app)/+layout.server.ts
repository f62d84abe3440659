import { error } from '@sveltejs/kit';
import { Problem } from '$lib/domain/core/errors';
import { requirePerson } from '$lib/server/context';
import { frameOf } from '$lib/server/frame';
import type { LayoutServerLoad } from './$types';

export const load: LayoutServerLoad = ({ locals }) => {
	// The guard has led away whoever looks; only a form comes so far with nobody signed in, and the answer to it is made by the hooks.
	if (locals.context.actor?.kind !== 'person') {
		const { status, detail, code } = new Problem('not-signed-in');
		error(status, { message: detail, code });
	}
	return frameOf(requirePerson(locals.context), locals.liveCursor);
};
