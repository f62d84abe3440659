import { z } from 'zod';

/** What the form of the page takes: a text with both limits, and one of two. */
export const questionForm = z.object({
	question: z
		.string()
		.min(3, 'Question: write at least 3 characters.')
		.max(40, 'Question: at most 40 characters.'),
	priority: z.enum(['routine', 'soon'], { error: 'Priority: choose routine or soon.' })
});
