/** How high an arm may be lifted after a sternotomy: one answer for the rule, the nameboard and the bedside. */
import { isPatientsOwn, type Limit, type LimitSet } from './limits';

/**
 * The limit that holds. Before the arm stage is cleared it is the one of the set; afterwards that of the clearance,
 * and the one of the set where the clearance states none. A narrower limit that was set for the patient holds beside
 * the clearance: two people said something about these arms, and the more careful word counts.
 *
 * @param clearance the arm stage in force with its own height in degrees, or null
 */
export function armLimitOf(
	{ limits }: LimitSet,
	clearance: { maxElevationDeg: number | null } | null
): Limit | null {
	if (clearance === null) {
		return limits['arm-elevation'];
	}
	const general = limits['arm-elevation.cleared'];
	const value = clearance.maxElevationDeg;
	if (general === null || value === null || (isPatientsOwn(general) && general.value < value)) {
		return general;
	}
	return { ...general, value, source: 'limit of the clearance', version: 'clearance', local: true };
}
