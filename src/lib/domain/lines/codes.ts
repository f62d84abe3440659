/** What may lie in or on a patient, from the airway down: the order of the list is the order on every screen. */
export const LINE_KINDS = [
	'endotracheal-tube',
	'arterial-line',
	'central-line',
	'peripheral-line',
	'chest-drain',
	'pacing-wires',
	'urinary-catheter'
] as const;
export type LineKind = (typeof LINE_KINDS)[number];
