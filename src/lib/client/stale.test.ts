import { describe, expect, it, vi } from 'vitest';
import { staleKeys, type StreamEvent, type Topic } from '$lib/domain/live/events';
import { queries } from './queries';

vi.mock('$app/environment', () => ({ browser: false, building: false, dev: false, version: '' }));

const EPISODE = 'an-episode';
const ID = 'the-subject';

/** The key of every query, asked about the subject or the episode of an event. */
function keyOf(name: keyof typeof queries): readonly string[] {
	const ask = queries[name] as (...given: unknown[]) => { queryKey: readonly string[] };
	const ofOneThing = queries[name].length > 1;
	const subject = ['thread', 'clearance', 'escalation'].includes(name) ? ID : EPISODE;
	return (ofOneThing ? ask(subject, {}) : ask({})).queryKey;
}

/** A stale key takes with it every query whose key begins with it, as the cache of the browser does. */
function reaches(event: StreamEvent, key: readonly string[]): boolean {
	return staleKeys(event).some((stale) => stale.every((part, index) => key[index] === part));
}

const heard = (topic: Topic): StreamEvent => ({
	topic,
	kind: 'x',
	id: ID,
	episodeId: EPISODE
});

/** What each answer is about, told apart from `staleKeys()`: by these topics it must be fetched anew. */
const ABOUT: Record<keyof typeof queries, readonly Topic[]> = {
	looseEnds: ['thread', 'referral', 'clearance', 'session', 'escalation', 'visit', 'episode', 'message'],
	alarms: ['alarm'],
	episodes: ['thread', 'referral', 'clearance', 'session', 'escalation', 'visit', 'episode'],
	episode: ['referral', 'clearance', 'session', 'escalation', 'visit', 'episode'],
	thread: ['thread', 'referral', 'clearance'],
	level: ['session', 'episode'],
	patientLimits: ['episode'],
	ranges: ['episode'],
	clearance: ['clearance'],
	sessions: ['session'],
	visits: ['visit', 'message'],
	patientVisits: ['visit', 'message'],
	patientPage: ['visit', 'message'],
	closedDays: ['visit', 'message'],
	delivery: ['delivery'],
	escalation: ['escalation', 'message']
};

describe('staleKeys', () => {
	it('is asked here about every query that a page makes', () => {
		expect(Object.keys(ABOUT).toSorted()).toEqual(Object.keys(queries).toSorted());
	});

	const pairs = Object.entries(ABOUT).flatMap(([name, topics]) => topics.map((topic) => ({ name, topic })));
	it.each(pairs)('makes $name stale when $topic changes', ({ name, topic }) => {
		expect(reaches(heard(topic), keyOf(name as keyof typeof queries))).toBe(true);
	});

	it('leaves what another patient’s event says nothing about', () => {
		const other: StreamEvent = { ...heard('session'), episodeId: 'another' };
		expect(reaches(other, keyOf('sessions'))).toBe(false);
		expect(reaches(other, keyOf('episode'))).toBe(false);
	});
});
