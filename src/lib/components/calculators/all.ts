import { corridorSpec, energySpec, heartRateSpec } from './effort';
import { earlyWarningSpec, pressuresSpec } from './observations';
import type { CalculatorSpec } from './spec';
import { walkChangeSpec, walkTestSpec } from './walk';

/** Every calculator of the page, in its order. */
export const CALCULATOR_SPECS: readonly CalculatorSpec[] = [
	earlyWarningSpec,
	pressuresSpec,
	corridorSpec,
	energySpec,
	heartRateSpec,
	walkTestSpec,
	walkChangeSpec
];
