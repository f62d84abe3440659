import type { SternumFinding, WoundFinding } from './codes';

/** One look at the wound and one hand on the breastbone; null for what was not looked at. */
export interface WoundNote {
	at: string;
	by: string;
	wound: WoundFinding | null;
	sternum: SternumFinding | null;
	note: string | null;
}
