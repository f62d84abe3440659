import { walkTest } from '$lib/domain/calculators';
import { walkTestBody } from '$lib/domain/calculators/forms';
import { computing } from '$lib/server/http/endpoint';

export const POST = computing(walkTestBody, walkTest);
