import { error } from '@sveltejs/kit';
import { message, superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { dev } from '$app/environment';
import { env } from '$env/dynamic/public';
import { questionForm } from './schema';
import type { Actions, PageServerLoad } from './$types';

/** The page is for those who build pages, as `/style` is. */
function onlyForBuilders(): void {
	if (!dev && env.PUBLIC_STYLE_PAGE !== '1') {
		error(404, 'Not found');
	}
}

export const load: PageServerLoad = async () => {
	onlyForBuilders();
	return { form: await superValidate(zod4(questionForm)), key: 'a-key-from-the-server' };
};

/** Every way a form can end, chosen by what is typed. */
export const actions: Actions = {
	ask: async ({ request }) => {
		onlyForBuilders();
		const data = await request.formData();
		const form = await superValidate(data, zod4(questionForm));
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
