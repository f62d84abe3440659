import type { Grade, Post } from '../core/codes';
import type { ChainPost } from './views';

/**
 * Who is told next, and after how long, until somebody takes the escalation.
 *
 * High: the nurse on cover and the nurse in charge at once, both again after two minutes, the physician after
 * three, the surgeon after eight; then everybody again every five minutes without end. Medium and low give more
 * time. Times are common practice, no published source; a unit may change them.
 */
export interface ChainStep {
	step: number;
	afterSeconds: number;
	post: Post;
}

/** Who was named as told in person has so long to confirm before the chain starts; common practice. */
export const IN_PERSON_MS = 2 * 60 * 1000;

interface Policy {
	steps: readonly (readonly [afterSeconds: number, posts: readonly Post[]])[];
	/** After the last step everybody is told again at this distance. */
	repeatSeconds: number;
}

const NURSES = ['nurse', 'nurse-in-charge'] as const;
const EVERYBODY = ['nurse', 'nurse-in-charge', 'physician', 'surgeon'] as const;

const POLICIES: Record<Grade, Policy> = {
	high: {
		steps: [
			[0, NURSES],
			[120, NURSES],
			[180, ['physician']],
			[480, ['surgeon']]
		],
		repeatSeconds: 300
	},
	medium: {
		steps: [
			[0, NURSES],
			[600, NURSES],
			[1800, ['physician']]
		],
		repeatSeconds: 1800
	},
	low: {
		steps: [
			[0, ['nurse']],
			[3600, NURSES],
			[14400, ['physician']]
		],
		repeatSeconds: 14400
	}
};

/**
 * The chain as it is announced when an escalation is raised: one row for each post of each step.
 * @param delayMs how long after the raising it starts
 */
export function chainOf(grade: Grade, delayMs = 0): ChainStep[] {
	return POLICIES[grade].steps.flatMap(([afterSeconds, posts], step) =>
		posts.map((post) => ({ step, afterSeconds: afterSeconds + delayMs / 1000, post }))
	);
}

/** The start that makes a step due at an instant: a chain that goes on keeps the distances between its steps. */
export function startFor(grade: Grade, step: number, at: number): number {
	return at - chainStep(grade, step).afterSeconds * 1000;
}

/** Who is told at a step, and how long after the raising it is due. Steps past the last one repeat the whole chain. */
export function chainStep(grade: Grade, step: number): { afterSeconds: number; posts: readonly Post[] } {
	const { steps, repeatSeconds } = POLICIES[grade];
	const planned = steps[step];
	if (planned) {
		return { afterSeconds: planned[0], posts: planned[1] };
	}
	const last = steps.at(-1)?.[0] ?? 0;
	return { afterSeconds: last + (step - steps.length + 1) * repeatSeconds, posts: EVERYBODY };
}

/** The planned steps, each with whether it was told. `lastTold` is the number of the last told step, -1 for none. */
export function chainPosts(grade: Grade, lastTold: number): ChainPost[] {
	return POLICIES[grade].steps.map(([afterSeconds, posts], step) => ({
		afterSeconds,
		posts,
		told: step <= lastTold
	}));
}

/** True once everybody was told and nobody took it: every screen of the unit says so. */
export function isChainSpent(grade: Grade, nextStep: number): boolean {
	return nextStep >= POLICIES[grade].steps.length;
}

/**
 * While nobody has it, or its holder does not come: does every screen of the unit show it? A high one at once, any
 * other once its chain is spent.
 */
export function isOverEveryScreen({ grade, nextStep }: { grade: Grade; nextStep: number | null }): boolean {
	return grade === 'high' || (nextStep !== null && isChainSpent(grade, nextStep));
}

/**
 * The step that is due at `now` and when the one after it is due. After a stop of the server several steps can be
 * overdue: they are told together, oldest first, and the timer goes on from the last.
 * @param raisedAt milliseconds UTC
 */
export function dueSteps(
	grade: Grade,
	raisedAt: number,
	nextStep: number,
	now: number
): { due: number[]; nextStep: number; nextAt: number } {
	const at = (step: number) => raisedAt + chainStep(grade, step).afterSeconds * 1000;
	const due: number[] = [];
	let step = nextStep;
	while (at(step) <= now) {
		due.push(step);
		step += 1;
	}
	// A long stop must not send the same people a heap of repeats: of those only the newest is told.
	const planned = due.filter((s) => !isChainSpent(grade, s));
	const repeats = due.filter((s) => isChainSpent(grade, s));
	return { due: [...planned, ...repeats.slice(-1)], nextStep: step, nextAt: at(step) };
}
