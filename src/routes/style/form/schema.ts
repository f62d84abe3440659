import { z } from 'zod';
import { tooLong } from '$lib/domain/core/fields';

/** What the form of the page takes: a text with both limits, and one of two. */
export const questionForm = z.object({
	question: z
		.string()
		.min(3, {
			error: ({ input }) => `Question has ${String(input).length} characters, and the least is 3.`
		})
		.max(40, tooLong('Question', 40)),
	priority: z.enum(['routine', 'soon'], { error: 'Priority: choose routine or soon.' })
});
