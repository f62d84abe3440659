/** What is noted of a healing chest: closed lists, the mildest first. Common practice, no published source. */

/** The skin over the breastbone. */
export const WOUND_FINDINGS = ['dry', 'moist', 'weeping', 'open'] as const;
export type WoundFinding = (typeof WOUND_FINDINGS)[number];

/** The breastbone under the hand, on coughing. */
export const STERNUM_FINDINGS = ['stable', 'click', 'moves'] as const;
export type SternumFinding = (typeof STERNUM_FINDINGS)[number];
