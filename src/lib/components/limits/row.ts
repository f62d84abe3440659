/** One limit in a list of them, with what can be done about it at its right. */
export const LIMIT_ROW = 'flex flex-wrap items-start justify-between gap-x-6 gap-y-2 py-2.5';
