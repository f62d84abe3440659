import { energy } from '$lib/domain/calculators';
import { energyBody } from '$lib/domain/calculators/forms';
import { computing } from '$lib/server/http/endpoint';

export const POST = computing(energyBody, energy);
