import type { ClearanceInForce, LimitSet, Phase } from '$lib/domain/bedside';
import type { LocalActivity } from '$lib/domain/bedside/activities/local';
import { limitsOfPatient, setOfUnit } from '$lib/domain/bedside/limits/layers';
import type { PrescribedRange } from '$lib/domain/bedside/limits/prescribed';
import { isInForce } from '$lib/domain/clearances/states';
import { CLEARANCE_KINDS, LEVELS, type ClearanceKind, type Level, type Rhythm } from '$lib/domain/core/codes';
import type { LocalDate } from '$lib/domain/core/time';
import type { ClearanceLine, Nameboard } from '$lib/domain/episodes/views';

/** What the record knows that a session is judged by. */
export interface BedsideRecord {
	level: Level;
	phase: Phase;
	betaBlocked: boolean | null;
	rhythm: Rhythm | null;
	sternotomy: boolean;
	clearances: ClearanceInForce[];
	/** The limits of unit and patient that judge, as they are when the record is read. */
	limits: LimitSet;
	/** The range prescribed for an outpatient, laid into the limits already. */
	range: PrescribedRange | null;
	/** What the unit says about activities in place of the catalogue. */
	wordings: readonly LocalActivity[];
}

type Known = Pick<
	Nameboard,
	| 'level'
	| 'phase'
	| 'betaBlocked'
	| 'rhythm'
	| 'operatedAt'
	| 'precautions'
	| 'clearances'
	| 'limits'
	| 'wordings'
>;

/**
 * The record as the rules want it. Without an operation on record the precautions of one are kept: nobody has
 * said that the breastbone is whole.
 * @param today in the zone of the hospital; a clearance whose review date is past no longer counts
 */
export function recordOf(board: Known, today: LocalDate): BedsideRecord {
	return {
		level: LEVELS.find((level) => level === board.level) ?? 1,
		phase: board.phase,
		betaBlocked: board.betaBlocked,
		rhythm: board.rhythm,
		wordings: board.wordings,
		range: board.phase === 'outpatient' ? (board.limits.prescribed ?? null) : null,
		limits: limitsOfPatient(setOfUnit(board.limits.unit, board.phase), board.limits),
		sternotomy: board.operatedAt === null || board.precautions.sternal,
		clearances: CLEARANCE_KINDS.flatMap((kind) => {
			const newest = newestOf(board.clearances, kind);
			return newest ? [toRuleClearance(newest, today)] : [];
		})
	};
}

/** The newest clearance of a kind that counts from the latest operation; null when none was asked. */
export function newestOf(clearances: readonly ClearanceLine[], kind: ClearanceKind): ClearanceLine | null {
	return clearances.find((line) => line.kind === kind && line.current) ?? null;
}

function toRuleClearance(line: ClearanceLine, today: LocalDate): ClearanceInForce {
	const lapsed = line.state.startsWith('given') && !isInForce(line, today);
	return {
		kind: line.kind,
		state: lapsed ? 'lapsed' : line.state,
		maxElevationDeg: line.limits?.maxElevationDeg ?? null,
		maxLoadKg: line.limits?.maxLoadKg ?? null
	};
}
