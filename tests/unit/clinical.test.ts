import { describe, expect, it } from 'vitest';
import { LIMIT_KEYS, RULE_IDS, SYMPTOMS } from '$lib/domain/bedside/codes';
import { ACTIVITY_CODES } from '$lib/domain/bedside/activities/codes';
import { SOURCES } from '$lib/domain/bedside/limits/sources';
import { grades, judge } from '$lib/domain/bedside/testing/sample';
import { CALCULATORS } from '$lib/domain/calculators/rulebook';
import { clinicalDocument } from '$lib/domain/clinical/document';

const TEXT = clinicalDocument();

/** The first cells of the rows below a heading. */
function namesUnder(heading: string): string[] {
	const section = TEXT.split(/^## /m).find((part) => part.startsWith(`${heading}\n`)) ?? '';
	const rows = section.split('\n').filter((line) => line.startsWith('|'));
	return rows.slice(2).map((line) => (line.split(' | ')[0] ?? '').replace(/^\| |`/g, ''));
}

describe('docs/CLINICAL.md', () => {
	// Where it differs, `npm run docs:clinical` writes it anew; what changed is then read and committed.
	it('is what the code says', async () => {
		await expect(TEXT).toMatchFileSnapshot('../../docs/CLINICAL.md');
	});

	it.each([
		['The rules', RULE_IDS],
		['The limits', LIMIT_KEYS],
		['The activities', ACTIVITY_CODES],
		['The sources', Object.keys(SOURCES)],
		['The calculators', CALCULATORS.map(({ name }) => name)]
	])('leaves nothing out of %s', (heading, expected) => {
		expect(namesUnder(heading).toSorted()).toEqual([...expected].toSorted());
	});

	it('names the symptoms that stop as the rules judge them', () => {
		const stopping = SYMPTOMS.filter(
			(symptom) => grades(judge({ symptoms: [symptom] }), 'symptom')[0] === 'stop during'
		);
		const [, named = ''] = /^- These symptoms stop: ([^.]*)\./m.exec(TEXT) ?? [];
		expect(named.split(', ').toSorted()).toEqual(stopping.toSorted());
	});
});
