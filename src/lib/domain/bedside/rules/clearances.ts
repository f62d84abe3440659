/**
 * Clearances. Some activities start only when a named person has said yes: arm exercise after a sternotomy, the
 * stairs, eating and drinking, the treadmill. Done without the clearance in force, they stop. Leaving the bed and
 * walking in the corridor follow the level, as a ward allows them without asking for each patient; they stop
 * only while somebody has refused, held or withdrawn that clearance for this patient, or let it lapse. The arm
 * stage is asked for after a sternotomy only.
 */
import type { ClearanceKind, ClearanceState } from '../../core/codes';
import type { Activity } from '../activities/activity';
import type { ClearanceInForce, Context } from '../forms';
import { cite } from '../limits/sources';
import { withoutLimit, type Rule } from './rule';

/** A clearance in force, with the limits it was given with; null where none is stated. */
export interface Granted {
	readonly maxElevationDeg: number | null;
	readonly maxLoadKg: number | null;
}

/** The clearance of a kind, or null when none is in force. Of several the narrowest limits hold. */
export function granted({ clearances }: Pick<Context, 'clearances'>, kind: ClearanceKind): Granted | null {
	const found = (clearances ?? []).filter((clearance) => inForce(clearance, kind)).map(limitsOf);
	if (found.length === 0) {
		return null;
	}
	return {
		maxElevationDeg: narrowest(found.map(({ maxElevationDeg }) => maxElevationDeg)),
		maxLoadKg: narrowest(found.map(({ maxLoadKg }) => maxLoadKg))
	};
}

/** The clearance that bars this activity for this patient now, or null when it may be done. */
export function lackingClearance(
	context: Pick<Context, 'clearances' | 'sternotomy'>,
	{ clearance, heldBy }: Pick<Activity, 'clearance' | 'heldBy'>
): ClearanceKind | null {
	if (clearance !== null && needed(context, clearance) && granted(context, clearance) === null) {
		return clearance;
	}
	return heldBy !== null && isHeld(context, heldBy) ? heldBy : null;
}

export const CLEARANCE_WORDS: Record<ClearanceKind, string> = {
	'arm-stage': 'the arm stage',
	'out-of-bed': 'leaving the bed',
	corridor: 'walking in the corridor',
	stairs: 'the stairs',
	'oral-intake': 'eating and drinking',
	treadmill: 'the treadmill',
	'precautions-end': 'the end of the precautions',
	discharge: 'discharge'
};

export const clearanceMissing: Rule = {
	id: 'clearance-missing',
	words:
		'An activity that needs a clearance is not done before it is in force, and none is done while its clearance is refused, held, withdrawn or lapsed.',
	sources: ['common-practice'],
	judge: ({ context, activities, stage }) =>
		activities.flatMap(({ activity }) => {
			const kind = lackingClearance(context, activity);
			if (kind === null) {
				return [];
			}
			const reason = `${activity.name} needs the clearance for ${CLEARANCE_WORDS[kind]}, and none is in force.`;
			return [
				withoutLimit('clearance-missing', 'stop', stage, activity.code, reason, cite('common-practice'))
			];
		}),
	lacks: () => false
};

function needed({ sternotomy }: Pick<Context, 'sternotomy'>, kind: ClearanceKind): boolean {
	return kind !== 'arm-stage' || sternotomy;
}

const HOLDS: readonly ClearanceState[] = ['withheld', 'on-hold', 'withdrawn', 'lapsed'];

/** True while somebody has said no and nobody has said yes. */
function isHeld(context: Pick<Context, 'clearances'>, kind: ClearanceKind): boolean {
	const saidNo = (context.clearances ?? []).some(
		(clearance) =>
			typeof clearance !== 'string' &&
			clearance.kind === kind &&
			HOLDS.some((state) => state === clearance.state)
	);
	return saidNo && granted(context, kind) === null;
}

function inForce(clearance: ClearanceInForce, kind: ClearanceKind): boolean {
	if (typeof clearance === 'string') {
		return clearance === kind;
	}
	const { state } = clearance;
	return clearance.kind === kind && (state == null || state === 'given' || state === 'given-with-limits');
}

function limitsOf(clearance: ClearanceInForce): Granted {
	if (typeof clearance === 'string') {
		return { maxElevationDeg: null, maxLoadKg: null };
	}
	const { maxElevationDeg, maxLoadKg, limits } = clearance;
	return {
		maxElevationDeg: narrowest([maxElevationDeg ?? null, limits?.maxElevationDeg ?? null]),
		maxLoadKg: narrowest([maxLoadKg ?? null, limits?.maxLoadKg ?? null])
	};
}

function narrowest(values: readonly (number | null)[]): number | null {
	const stated = values.filter((value) => value !== null);
	return stated.length === 0 ? null : Math.min(...stated);
}
