/** What can be taken, with a second line that tells two of the same name apart. */
export interface ComboboxOption {
	readonly value: string;
	readonly label: string;
	readonly hint?: string;
}

/**
 * The options in which every typed word begins a word of the name or the hint, without regard to case and accents:
 * `lis mar` finds Marta Lisowska, `lodz` finds Łódź.
 */
export function fitting(options: readonly ComboboxOption[], typed: string): ComboboxOption[] {
	const wanted = wordsOf(typed);
	return options.filter(({ label, hint }) => {
		const words = wordsOf(`${label} ${hint ?? ''}`);
		return wanted.every((start) => words.some((word) => word.startsWith(start)));
	});
}

function wordsOf(text: string): string[] {
	return plain(text)
		.split(/[\s,.;:()'-]+/)
		.filter((word) => word !== '');
}

/** Letters whose stroke is no accent, and so is not taken apart by normalisation. */
const STROKES: Readonly<Record<string, string>> = {
	ł: 'l',
	ø: 'o',
	đ: 'd',
	ß: 'ss',
	æ: 'ae',
	œ: 'oe',
	ı: 'i'
};

function plain(text: string): string {
	const bare = text.normalize('NFD').replace(/\p{Diacritic}/gu, '');
	return bare.toLowerCase().replace(/[łøđßæœı]/g, (letter) => STROKES[letter] ?? letter);
}
