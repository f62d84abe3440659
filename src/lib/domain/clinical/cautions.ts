/** The cautions that stand where numbers are shown. */
export const CAUTIONS: readonly string[] = [
	'Decision support only. Local policy and licensed practice decide, and no result replaces the call bell.',
	'A missing reading is never a normal one.',
	'A drug that slows the heart, atrial fibrillation and pacing blunt the rules on the pulse: symptoms, exertion and pressure then decide.',
	'The early-warning score is taken at rest, never straight after exercise. Its second saturation scale is used only on the entry of a named clinician.',
	'METs and predictions of the walk test are estimates, made for a range. Outside it the number is shown and marked.',
	'Sternal precautions end by a surgeon’s decision. A calendar clears nobody.'
];
