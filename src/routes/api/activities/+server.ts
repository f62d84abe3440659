import { ACTIVITIES } from '$lib/domain/bedside/activities/activities';
import { reading } from '$lib/server/http/endpoint';

export const GET = reading({
	permission: 'own-account.change',
	run: () => Promise.resolve({ items: ACTIVITIES, next: null })
});
