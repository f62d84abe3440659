import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { Nameboard } from '$lib/domain/episodes/views';
import { draftEscalation, type EscalationDraft } from '$lib/domain/escalations/draft';
import type { Reader } from '$lib/format';
import type { BedsideSession } from './session.svelte';

type Session = Pick<BedsideSession, 'draft' | 'assessment' | 'verdict'>;

/** The call about a session that is not recorded yet, in the same words as if it were. */
export function callOf(
	{ draft, assessment, verdict }: Session,
	board: Nameboard,
	{ now, zone }: Reader
): EscalationDraft {
	const { before, during, after, context } = assessment;
	const record = {
		...board,
		level: draft.level,
		betaBlocked: context.betaBlocked,
		rhythm: draft.rhythm,
		maxElevationDeg: board.precautions.maxElevationDeg
	};
	const session = {
		startedAt: toRfc3339(draft.startedAt ?? now),
		endedAt: toRfc3339(now),
		level: draft.level,
		outcome: verdict.outcome,
		activities: draft.activities.map(({ code }) => ({ code, name: activityByCode(code).name })),
		before,
		during,
		after,
		findings: verdict.findings
	};
	return draftEscalation(record, session, zone);
}
