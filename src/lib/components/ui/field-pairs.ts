/**
 * Fields side by side. What stands above the control is as tall in both fields of a row, so that the controls stand in
 * one line although only one of the two has a hint.
 */
export const FIELD_PAIRS =
	'grid items-start gap-5 sm:grid-cols-2 sm:[&>*]:row-span-2 sm:[&>[data-field]]:grid-rows-subgrid sm:[&>[data-field]]:gap-y-1.5';
