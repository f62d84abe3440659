import { earlyWarning } from '$lib/domain/calculators';
import { earlyWarningBody } from '$lib/domain/calculators/forms';
import { computing } from '$lib/server/http/endpoint';

export const POST = computing(earlyWarningBody, earlyWarning);
