import { heartRateTarget } from '$lib/domain/calculators';
import { heartRateTargetBody } from '$lib/domain/calculators/forms';
import { computing } from '$lib/server/http/endpoint';

export const POST = computing(heartRateTargetBody, heartRateTarget);
