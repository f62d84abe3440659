/** What is asked for around a patient's own page: sending its link, and the deeds of the page itself. */
import { z } from 'zod';

/** The ways by which the link of a patient's page is sent. */
export const PAGE_WAYS = ['sms', 'mail'] as const;
export type PageWay = (typeof PAGE_WAYS)[number];

/** Body of `POST /api/episodes/:id/patient-page`. */
export const sendPageBody = z.strictObject({
	way: z.enum(PAGE_WAYS, `The way is one of ${PAGE_WAYS.join(', ')}.`)
});

/** How much a patient may write about why they cannot come. */
export const WHY_MAX = 200;

/** The deeds of the page. Each form carries a key, so that two presses are one deed. */
export const pageDeed = z.object({
	deed: z.enum(['confirm', 'decline']),
	visit: z.string().min(1).max(64),
	/** Which time of the visit the patient saw: a yes to an old one is none to the new. */
	sequence: z.coerce.number().int().min(0),
	why: z
		.string()
		.transform((typed) => typed.replace(/\p{Cc}+/gu, ' ').trim())
		.pipe(z.string().max(WHY_MAX))
		.default(''),
	key: z.string().max(200).default('')
});
export type PageDeed = z.infer<typeof pageDeed>;
