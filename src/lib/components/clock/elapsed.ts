import { duration } from '$lib/format';

const DAY_SECONDS = 24 * 60 * 60;

/**
 * A running clock, as one reads it across a room: `0:46`, `1:46`, `59:59`, `1:02:07`; from two days on in whole days.
 * A negative length reads as `0:00`.
 */
export function elapsed(milliseconds: number): string {
	const seconds = Math.max(0, Math.floor(milliseconds / 1000));
	if (seconds >= 2 * DAY_SECONDS) {
		return duration(milliseconds);
	}
	const parts = [Math.floor(seconds / 3600), Math.floor(seconds / 60) % 60, seconds % 60];
	const shown = parts[0] === 0 ? parts.slice(1) : parts;
	return shown.map((part, index) => (index === 0 ? `${part}` : `${part}`.padStart(2, '0'))).join(':');
}
