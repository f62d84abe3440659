import { describe, expect, it } from 'vitest';
import { hangingEnds } from './hanging';
import { LOOSE_END_KINDS, type OpenThing } from './loose-ends';

const thing = (given: Partial<OpenThing>): OpenThing => ({
	kind: 'clearance',
	id: 'a',
	episodeId: 'stay',
	threadId: null,
	unitId: 'ward',
	unit: 'Tern Ward',
	bed: '4',
	patientName: 'Ide Quillfeather',
	grade: null,
	code: 'arm-stage',
	priority: null,
	text: 'May the arms start?',
	askedById: 'therapist',
	askedBy: 'Iona Aldous',
	alsoAskedByIds: [],
	heldById: null,
	heldBy: null,
	since: Date.parse('2026-03-03T09:00:00Z'),
	due: null,
	...given
});
const call = thing({ kind: 'escalation', id: 'call', grade: 'high', code: null });
const held = thing({ kind: 'escalation-taken', id: 'call', grade: 'high', code: 'on-the-way' });

describe('hangingEnds', () => {
	it('says what kind it is and who owes it, and not a word of what was written', () => {
		expect(hangingEnds([thing({})], true).get('stay')).toEqual([
			{ kind: 'clearance', code: 'arm-stage', strand: 'medical', since: '2026-03-03T09:00:00.000Z' }
		]);
	});

	it('hangs the most urgent first, whatever the order it was found in', () => {
		const found = [thing({}), thing({ kind: 'recheck', id: 'b' }), call];
		expect(
			hangingEnds(found, true)
				.get('stay')
				?.map(({ kind }) => kind)
		).toEqual(['escalation', 'recheck', 'clearance']);
	});

	it('hangs one call once, however many people it waits on', () => {
		expect(hangingEnds([held, call], true).get('stay')).toHaveLength(1);
	});

	it('keeps two calls apart', () => {
		expect(hangingEnds([call, { ...held, id: 'another' }], true).get('stay')).toHaveLength(2);
	});

	it('tells nothing of calls to who may not read them', () => {
		const all = LOOSE_END_KINDS.map((kind, index) => thing({ kind, id: String(index) }));
		const kinds = hangingEnds(all, false)
			.get('stay')
			?.map(({ kind }) => kind);
		expect(kinds).toHaveLength(LOOSE_END_KINDS.length - 6);
		expect(kinds).not.toContain('recheck');
		expect(kinds).not.toContain('physician-to-tell');
	});

	it('leaves out what is about no patient, and keeps patients apart', () => {
		const ends = hangingEnds([thing({ episodeId: null }), thing({ episodeId: 'other' })], true);
		expect([...ends.keys()]).toEqual(['other']);
	});
});
