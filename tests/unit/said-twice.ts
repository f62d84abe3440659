import { extendTailwindMerge } from 'tailwind-merge';
import { RADIUS, SPACE, TYPE } from '../../src/lib/components/tokens';

const merge = extendTailwindMerge({
	extend: {
		theme: { text: Object.keys(TYPE), radius: Object.keys(RADIUS), spacing: Object.keys(SPACE) }
	},
	// A height of lines stands whichever size of text is said after it: the classes of sizes ask for it first.
	override: { conflictingClassGroups: { 'font-size': [] } }
});

/** The classes that a later one makes void: which of the two wins is the order of the sheet, not the order here. */
export function saidTwice(look: string, given = ''): string[] {
	const kept = merge(look, given).split(/\s+/);
	return `${look} ${given}`
		.split(/\s+/)
		.filter(Boolean)
		.filter((word) => {
			const at = kept.indexOf(word);
			if (at >= 0) {
				kept.splice(at, 1);
			}
			return at < 0;
		});
}
