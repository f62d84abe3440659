/**
 * Which of `count` tabs a key leads to from the one `at`; null when the key is none of theirs. The ends meet, as the
 * tabs pattern of the ARIA authoring practices has it.
 */
export function tabAfter(key: string, at: number, count: number): number | null {
	switch (key) {
		case 'ArrowRight':
			return (at + 1) % count;
		case 'ArrowLeft':
			return (at - 1 + count) % count;
		case 'Home':
			return 0;
		case 'End':
			return count - 1;
		default:
			return null;
	}
}
