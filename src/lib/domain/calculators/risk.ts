/**
 * How closely an outpatient is watched in exercise: the classes of the AACVPR line (PMC8006124, table 3). High is
 * any one mark; low is all of the good ones; everything else is moderate. Where the printed table gives complex
 * ventricular arrhythmia under two classes it counts as high, the careful one. That the symptoms of the highest
 * class begin under 5 METs is from memory.
 */
export const RISK_MARKS = [
	'complex-arrhythmia',
	'symptoms',
	'abnormal-haemodynamics',
	'cardiac-arrest',
	'complicated-event',
	'heart-failure',
	'ischaemia',
	'depression'
] as const;
export type RiskMark = (typeof RISK_MARKS)[number];

export type RiskClass = 'low' | 'moderate' | 'high';

/** An ejection fraction below this is high risk; from the second on it is low, %. */
export const EJECTION_FRACTIONS = { high: 40, low: 50 } as const;
/** The capacity of low risk, METs. */
export const LOW_RISK_METS = 7;

/**
 * The class of an outpatient.
 * @param ejectionFraction %, null where it was not measured
 * @param mets exercise capacity, null where it was not tested
 * @param marks what is true of the patient
 */
export function riskClass(
	ejectionFraction: number | null,
	mets: number | null,
	marks: readonly RiskMark[]
): RiskClass {
	if (marks.length > 0 || (ejectionFraction !== null && ejectionFraction < EJECTION_FRACTIONS.high)) {
		return 'high';
	}
	const known = ejectionFraction !== null && mets !== null;
	return known && ejectionFraction >= EJECTION_FRACTIONS.low && mets >= LOW_RISK_METS ? 'low' : 'moderate';
}
