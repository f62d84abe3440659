/** The look that every control a person types or chooses in has in common. */
export const CONTROL =
	'block min-h-touch w-full min-w-0 rounded border border-soft bg-raised px-3 py-2 text-body text-ink placeholder:text-soft ' +
	'hover:border-ink aria-invalid:border-2 aria-invalid:border-ink ' +
	'[&[readonly]]:border-dashed [&[readonly]]:bg-transparent disabled:border-rule disabled:bg-sunk disabled:text-soft';

/** The unit inside the right edge of a control. */
export const CONTROL_UNIT =
	'pointer-events-none absolute inset-y-0 right-3 flex items-center text-fine text-soft';

/** A radio button that covers the words it belongs to: the whole of them is pressed, and it takes the focus. */
export const COVERING_RADIO = 'absolute inset-0 cursor-pointer appearance-none rounded outline-none';

/** The ring of focus around the words that such a radio button covers. */
export const COVERED_FOCUS =
	'has-focus-visible:outline-ink has-focus-visible:outline-3 has-focus-visible:outline-offset-2';
