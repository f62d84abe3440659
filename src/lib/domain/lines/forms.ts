import { z } from 'zod';
import { BOUNDS } from '../bedside/bounds';
import { bounded } from '../bedside/form-fields';
import { typedNumber } from '../core/fields';
import { LINE_KINDS } from './codes';

/** Which line is in now. */
export const lineInBody = z.strictObject({
	kind: z.enum(LINE_KINDS, `kind is one of ${LINE_KINDS.join(', ')}.`)
});
export type LineIn = z.infer<typeof lineInBody>;

/** The flow of oxygen in L/min; 0 says that there is none. */
export const oxygenBody = z.strictObject({ lpm: bounded('oxygenLpm', 'lpm') });
export type OxygenInput = z.infer<typeof oxygenBody>;

/** The same as a page posts it, as it was typed. */
export const oxygenForm = z.strictObject({
	lpm: typedNumber('Oxygen', { ...BOUNDS.oxygenLpm, needed: true })
});
export type OxygenFields = z.infer<typeof oxygenForm>;
