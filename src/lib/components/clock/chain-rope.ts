import type { Post } from '$lib/domain/core/codes';
import type { ChainPost } from '$lib/domain/escalations/views';
import { m } from '$lib/i18n/paraglide/messages';

/**
 * How far along the drawn chain the rope is laid, from 0 to 1. Each step has the same room whatever its length, so
 * that the words below it do not run into each other; within a step the rope grows evenly. Once the last step is
 * due there is nobody left to tell for the first time, and the rope is whole.
 */
export function laidShare(steps: readonly Pick<ChainPost, 'afterSeconds'>[], seconds: number): number {
	const reached = steps.findLastIndex((step) => step.afterSeconds <= seconds);
	const [from, to] = [steps[reached], steps[reached + 1]];
	if (!from) {
		return 0;
	}
	if (!to) {
		return 1;
	}
	const within = (seconds - from.afterSeconds) / (to.afterSeconds - from.afterSeconds);
	return (reached + within) / steps.length;
}

/** The word of each post, as one of a list of who is told. */
export const POST_WORDS: Record<Post, () => string> = {
	nurse: m.escalations_post_nurse,
	'nurse-in-charge': m.escalations_post_nurse_in_charge,
	physician: m.escalations_post_physician,
	surgeon: m.escalations_post_surgeon
};

/** Who is told at a step, short enough to stand below its post: both nurses are 'nurses', all four 'everybody'. */
export function postsWords(posts: readonly Post[]): string {
	if (posts.length > 2) {
		return m.escalations_posts_all();
	}
	const [first] = posts;
	return posts.length === 2 || !first ? m.escalations_posts_nurses() : POST_WORDS[first]();
}

/** `at once`, `after 2 min`, `after 4 h`: when a step is due, counted from the start of the chain. */
export function stepTimeWords(afterSeconds: number): string {
	if (afterSeconds === 0) {
		return m.escalations_step_at_once();
	}
	const minutes = Math.round(afterSeconds / 60);
	return minutes < 120
		? m.escalations_step_after_minutes({ minutes })
		: m.escalations_step_after_hours({ hours: Math.round(minutes / 60) });
}
