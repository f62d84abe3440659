/** How often the server says that a stream is alive, milliseconds. The contract with other programs allows 20 s. */
export const BEAT_MS = 15_000;

/** A stream that was silent for longer than this counts as dead, milliseconds: two beats did not come. */
export const SILENCE_MS = 2 * BEAT_MS;
