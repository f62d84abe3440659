import type { Nameboard } from '$lib/domain/episodes/views';
import { m } from '$lib/i18n/paraglide/messages';

/** That nothing may be taken by mouth, to stand first among what to beware of; nothing where it may. */
export function byMouthWords({ nothingByMouth }: Pick<Nameboard, 'nothingByMouth'>): string[] {
	return nothingByMouth ? [m.patient_nothing_by_mouth()] : [];
}
