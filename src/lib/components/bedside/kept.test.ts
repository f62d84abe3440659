import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { handOverCall, keepDraft, keptDraft, takeCall } from './kept';
import { draft } from './testing';

const CALL = { grade: 'high', situation: 's', background: 'b', assessment: 'a', request: 'r' } as const;

/** What a tab keeps. */
function storage(): Storage {
	const kept = new Map<string, string>();
	return {
		getItem: (name: string) => kept.get(name) ?? null,
		setItem: (name: string, value: string) => void kept.set(name, value),
		removeItem: (name: string) => void kept.delete(name)
	} as Storage;
}

beforeEach(() => void vi.stubGlobal('sessionStorage', storage()));
afterEach(() => void vi.unstubAllGlobals());

describe('a session that is being written', () => {
	it('survives a reload, and is gone once recorded', () => {
		keepDraft('u1', 'e1', draft());
		expect(keptDraft('u1', 'e1')).toEqual(draft());
		keepDraft('u1', 'e1', null);
		expect(keptDraft('u1', 'e1')).toBeNull();
	});

	it('is shown to nobody else, and for no other patient', () => {
		keepDraft('u1', 'e1', draft());
		expect(keptDraft('u2', 'e1')).toBeNull();
		expect(keptDraft('u1', 'e2')).toBeNull();
	});

	it('does without storage', () => {
		vi.stubGlobal('sessionStorage', {
			getItem: () => {
				throw new Error('closed');
			},
			setItem: () => {
				throw new Error('full');
			}
		});
		expect(() => keepDraft('u1', 'e1', draft())).not.toThrow();
		expect(keptDraft('u1', 'e1')).toBeNull();
	});
});

describe('a call that is handed over', () => {
	it('is taken once', () => {
		handOverCall('u1', 'e1', CALL);
		expect(takeCall('u1', 'e1')).toEqual(CALL);
		expect(takeCall('u1', 'e1')).toBeNull();
	});
});
