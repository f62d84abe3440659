/** The look that every control a person types or chooses in has in common. */
export const CONTROL =
	'block min-h-touch w-full rounded border border-soft bg-raised px-3 py-2 text-body text-ink placeholder:text-soft ' +
	'hover:border-ink aria-invalid:border-2 aria-invalid:border-ink ' +
	'[&[readonly]]:border-dashed [&[readonly]]:bg-transparent disabled:border-rule disabled:bg-sunk disabled:text-soft';
