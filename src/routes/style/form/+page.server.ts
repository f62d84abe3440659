import { error } from '@sveltejs/kit';
import { message, superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { z } from 'zod';
import { dev } from '$app/environment';
import { env } from '$env/dynamic/public';
import type { Actions, PageServerLoad } from './$types';

const schema = z.object({
	question: z
		.string()
		.min(3, 'Question: write at least 3 characters.')
		.max(40, 'Question: at most 40 characters.'),
	priority: z.enum(['routine', 'soon'], { error: 'Priority: choose routine or soon.' })
});

/** The page is for those who build pages, as `/style` is. */
function onlyForBuilders(): void {
	if (!dev && env.PUBLIC_STYLE_PAGE !== '1') {
		error(404, 'Not found');
	}
}

export const load: PageServerLoad = async () => {
	onlyForBuilders();
	return { form: await superValidate(zod4(schema)), key: 'a-key-from-the-server' };
};

/** Every way a form can end, chosen by what is typed. */
export const actions: Actions = {
	ask: async ({ request }) => {
		onlyForBuilders();
		const data = await request.formData();
		const form = await superValidate(data, zod4(schema));
		if (!form.valid) {
			return message(form, 'Nothing was asked.', { status: 400 });
		}
		if (form.data.question === 'signed out') {
			error(401, 'Sign in.');
		}
		if (form.data.question === 'broken') {
			error(503, 'Broken.');
		}
		if (form.data.question === 'forbidden') {
			error(403, 'A therapist asks for this.');
		}
		return message(form, `Asked with ${data.get('key')}.`);
	}
};
