/** The response rules in the order they are read out. Each identifier of `RULE_IDS` has exactly one row. */
import { absoluteRules } from './absolute';
import { armElevation } from './arms';
import { changeRules } from './change';
import { clearanceMissing } from './clearances';
import { readingMissing } from './missing';
import { posturalFall } from './postural';
import { newRhythm, rhythmCaveat } from './rhythm';
import type { Rule } from './rule';
import { airway, betaBlockerUnknown, helperMissing, notFollowing } from './safety';
import { stageRules } from './stage';
import { startCheck, temperatureCeiling } from './start';
import { symptomRule } from './symptoms';

export const RULES: readonly Rule[] = [
	startCheck,
	temperatureCeiling,
	...absoluteRules,
	...changeRules,
	...stageRules,
	posturalFall,
	symptomRule,
	newRhythm,
	rhythmCaveat,
	armElevation,
	clearanceMissing,
	notFollowing,
	airway,
	helperMissing,
	readingMissing,
	betaBlockerUnknown
];
