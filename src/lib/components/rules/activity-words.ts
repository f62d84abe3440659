import type { UnitActivity } from '$lib/domain/bedside/activities/local';
import { SOURCES, type SourceStatus } from '$lib/domain/bedside/limits/sources';
import { CLEARANCE_WORDS } from '$lib/domain/bedside/rules/clearances';
import { m } from '$lib/i18n/paraglide/messages';

/** How well a source is known. */
export const STATUS_WORDS: Record<SourceStatus, () => string> = {
	published: m.home_rules_status_published,
	secondary: m.home_rules_status_secondary,
	memory: m.home_rules_status_memory,
	'common-practice': m.home_rules_status_practice
};

/** A source with its status beside it; the one that is no source says so by its name. */
export function withStatus(title: string, status: SourceStatus): string {
	if (title === SOURCES['common-practice'].title) {
		return title;
	}
	return m.home_rules_source_status({ source: title, status: STATUS_WORDS[status]() });
}

/** What must be cleared before the activity, or may hold it. */
export function clearanceWords({ clearance, heldBy }: Pick<UnitActivity, 'clearance' | 'heldBy'>): string {
	if (clearance !== null) {
		return m.home_rules_needs_clearance({ kind: CLEARANCE_WORDS[clearance] });
	}
	return heldBy === null
		? m.home_rules_needs_none()
		: m.home_rules_unless_held({ kind: CLEARANCE_WORDS[heldBy] });
}

/** Where the figures of the dose come from. A figure without a published source is called common practice. */
export function doseSourceWords({ source, local }: Pick<UnitActivity, 'source' | 'local'>): string {
	if (local !== null) {
		return m.home_rules_dose_unit({ version: local.version, name: local.agreedBy, day: local.agreedOn });
	}
	return source === 'common-practice'
		? m.home_rules_common_practice()
		: withStatus(SOURCES[source].title, SOURCES[source].status);
}
