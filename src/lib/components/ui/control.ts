/** The look that every control a person types or chooses in has in common. */
const CONTROL =
	'block min-w-0 rounded border border-soft bg-raised placeholder:text-soft ' +
	'hover:border-ink aria-invalid:border-2 aria-invalid:border-ink ' +
	'[&[readonly]]:border-dashed [&[readonly]]:bg-transparent disabled:border-rule disabled:bg-sunk disabled:text-soft';

/** A field of a form, of a phone; a line that grows, several lines; and the numbers of a dose, a reading, a sum. */
const SIZES = {
	desk: 'min-h-touch px-3 py-2 text-body',
	phone: 'min-h-thumb px-3 py-2 text-body',
	line: 'max-h-40 min-h-touch px-3 py-2 text-body',
	lines: 'max-h-96 min-h-24 px-3 py-2 text-body',
	dose: 'h-12 px-3 py-2 text-title',
	reading: 'h-14 px-2 py-2 text-center text-figure',
	sum: 'h-thumb px-3 py-2 text-figure'
};
export type ControlSize = keyof typeof SIZES;

type Look = {
	size?: ControlSize;
	/** As wide as what stands in it, not as its place. */
	fit?: boolean;
	/** A finding says stop to what stands in it. */
	stop?: boolean;
};

/** The look of a control: its size, its width and whether it bears a stop. */
export function controlLook({ size = 'desk', fit = false, stop = false }: Look = {}): string[] {
	return [CONTROL, SIZES[size], fit ? 'w-auto' : 'w-full', stop ? 'text-high' : 'text-ink'];
}

/** The unit inside the right edge of a control. */
export const CONTROL_UNIT =
	'pointer-events-none absolute inset-y-0 right-3 flex items-center text-fine text-soft';

/** A radio button that covers the words it belongs to: the whole of them is pressed, and it takes the focus. */
export const COVERING_RADIO = 'absolute inset-0 cursor-pointer appearance-none rounded outline-none';

/** The ring of focus around the words that such a radio button covers. */
export const COVERED_FOCUS =
	'has-focus-visible:outline-ink has-focus-visible:outline-3 has-focus-visible:outline-offset-2';
