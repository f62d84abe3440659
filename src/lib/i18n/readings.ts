import type { Reading } from '../domain/bedside/forms';
import { m } from './paraglide/messages';

/** `128/74, pulse 76, saturation 96 %`; what was not measured is left out. */
export function readingText(reading: Reading): string {
	const parts = [
		reading.sbp != null ? `${reading.sbp}/${reading.dbp ?? '–'}` : '',
		reading.hr != null ? m.bedside_pulse({ hr: reading.hr }) : '',
		reading.spo2 != null ? m.bedside_saturation({ spo2: reading.spo2 }) : ''
	].filter((part) => part !== '');
	return parts.join(', ') || m.bedside_not_measured();
}
