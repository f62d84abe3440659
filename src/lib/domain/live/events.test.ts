import { describe, expect, it } from 'vitest';
import { staleKeys, TOPICS, type Topic } from './events';

/** What a clearance rests on is on record as sessions, calls for help, the stay itself and other clearances. */
const TOUCHING: readonly Topic[] = ['session', 'escalation', 'episode', 'clearance'];

describe('staleKeys', () => {
	it.each(TOPICS)('of "%s" reach an open decision exactly where its evidence may change', (topic) => {
		const keys = staleKeys({ topic, kind: 'changed', id: 'x', episodeId: 'e1' });
		expect(keys.some((key) => key.length === 1 && key[0] === 'clearance')).toBe(TOUCHING.includes(topic));
	});
});
