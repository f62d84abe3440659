import { pressures } from '$lib/domain/calculators';
import { pressuresBody } from '$lib/domain/calculators/forms';
import { computing } from '$lib/server/http/endpoint';

export const POST = computing(pressuresBody, pressures);
