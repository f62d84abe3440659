import type { Changeable, EvidenceNews } from '../domain/clearances/news';
import { m } from './paraglide/messages';

const CHANGE_WORDS: Record<Changeable, () => string> = {
	operation: m.clearances_news_operation,
	wound: m.clearances_news_wound,
	lines: m.clearances_news_lines,
	oxygen: m.clearances_news_oxygen,
	level: m.clearances_news_level,
	heart: m.clearances_news_heart,
	precautions: m.clearances_news_precautions
};

/** What is new in the evidence, the sessions first: `2 new sessions, wound noted`. */
export function newsWords({ sessions, escalations, changed }: EvidenceNews): string {
	return [
		...counted(sessions, m.clearances_news_session, m.clearances_news_sessions),
		...counted(escalations, m.clearances_news_escalation, m.clearances_news_escalations),
		...changed.map((change) => CHANGE_WORDS[change]())
	].join(', ');
}

function counted(count: number, one: () => string, more: (of: { count: number }) => string): string[] {
	return count === 0 ? [] : [count === 1 ? one() : more({ count })];
}
