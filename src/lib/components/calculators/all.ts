import { corridorSpec, energySpec, heartRateSpec } from './effort';
import { earlyWarningSpec, pressuresSpec } from './observations';
import { spirometerSpec } from './breathing';
import { riskSpec } from './outpatient';
import { heartFailureSpec, inpatientCeilingSpec } from './rates';
import { orthostaticSpec } from './rising';
import type { CalculatorSpec } from './spec';
import { walkChangeSpec, walkTestSpec } from './walk';

/** Every calculator of the page, in its order. */
export const CALCULATOR_SPECS: readonly CalculatorSpec[] = [
	earlyWarningSpec,
	pressuresSpec,
	orthostaticSpec,
	corridorSpec,
	energySpec,
	heartRateSpec,
	heartFailureSpec,
	inpatientCeilingSpec,
	walkTestSpec,
	walkChangeSpec,
	spirometerSpec,
	riskSpec
];
