import type { Instant } from '$lib/domain/core/time';
import type { LineKind } from '$lib/domain/lines/codes';
import { noteLineIn, noteLineOut, noteOxygen } from '../../lines/actions';
import { Later } from './later';
import type { PersonKey } from './people';
import type { Telling } from './telling';

/** What every patient comes with from theatre; after the breastbone was opened there are wires too. */
export const FROM_THEATRE = [
	'endotracheal-tube',
	'arterial-line',
	'central-line',
	'peripheral-line',
	'chest-drain',
	'urinary-catheter'
] as const satisfies readonly LineKind[];

/** Tells which lines a patient has, and on how much oxygen they are. */
export class ToldLines {
	readonly #in = new Map<LineKind, Later>();

	constructor(private readonly t: Telling) {}

	in(at: Instant, who: PersonKey, ...kinds: LineKind[]): this {
		for (const kind of kinds) {
			const made = new Later(`the ${kind}`);
			this.#in.set(kind, made);
			this.t.deed(at, who, async (as, id) => made.is((await noteLineIn(as, id, { kind })).result.id));
		}
		return this;
	}

	out(at: Instant, who: PersonKey, ...kinds: LineKind[]): this {
		for (const kind of kinds) {
			const made = this.#in.get(kind);
			if (!made) {
				throw new Error(`The ${kind} was never in.`);
			}
			this.t.deed(at, who, (as) => noteLineOut(as, made.id));
		}
		return this;
	}

	oxygen(at: Instant, who: PersonKey, lpm: number): this {
		this.t.deed(at, who, (as, id) => noteOxygen(as, id, { lpm }));
		return this;
	}
}
