import { assess } from '$lib/domain/bedside';
import { assessBody } from '$lib/domain/bedside/forms';
import { computing } from '$lib/server/http/endpoint';

/** The response rules on readings that are not stored. */
export const POST = computing(assessBody, (input) => assess(input));
