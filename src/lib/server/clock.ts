/**
 * The only reader of the wall clock. Code takes `now` (milliseconds since 1970, UTC) from here once for each
 * request or round of work and passes it down, so that rules stay pure and the demonstration can move time.
 */
let offsetMs = 0;
let stoppedAt: number | null = null;

/** The current instant in milliseconds UTC, moved by whatever {@link advanceClock} added. */
export function now(): number {
	return (stoppedAt ?? Date.now()) + offsetMs;
}

/** Let the clock stand at an instant (`TEST_CLOCK_AT`), so that pictures are the same whenever they are taken. */
export function stopClockAt(instant: number): void {
	stoppedAt = instant;
}

/**
 * Move the clock forward, for tests and demonstrations (`TEST_CLOCK=1`).
 * @throws RangeError when the step is negative or not a whole number: time never goes back.
 */
export function advanceClock(byMs: number): void {
	if (!Number.isSafeInteger(byMs) || byMs < 0) {
		throw new RangeError(`advanceMs must be a whole number from 0 up, not ${byMs}.`);
	}
	offsetMs += byMs;
}

/** How far the clock was moved so far, milliseconds. */
export function movedBy(): number {
	return offsetMs;
}
