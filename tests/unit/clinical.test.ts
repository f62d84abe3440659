import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { SETS, SYMPTOMS } from '$lib/domain/bedside/codes';
import { SOURCES, type SourceStatus } from '$lib/domain/bedside/limits/sources';
import { CAUTION_SHARE, DEFAULT_LIMITS, DEFAULTS_VERSION } from '$lib/domain/bedside/limits/table';
import { rulebook, type RulebookLimit, type RulebookRow } from '$lib/domain/bedside/rulebook';
import { grades, judge } from '$lib/domain/bedside/testing/sample';
import { CALCULATORS } from '$lib/domain/calculators/rulebook';

/** docs/CLINICAL.md against the tables that judge. Where they differ, the row that is expected is the row to write. */
const TEXT = readFileSync('docs/CLINICAL.md', 'utf8');

const STANDING: Record<SourceStatus, string> = {
	published: 'seen',
	secondary: 'secondary',
	memory: 'from memory',
	'common-practice': 'common practice'
};

/** The rows below a heading, without the table's own head. */
function rowsUnder(heading: string): string[] {
	const section = TEXT.split(/^## /m).find((part) => part.startsWith(`${heading}\n`)) ?? '';
	return section
		.split('\n')
		.filter((line) => line.startsWith('|'))
		.slice(2);
}

const row = (...cells: string[]) => `| ${cells.join(' | ')} |`;
const code = (text: string) => `\`${text}\``;

function ruleRow({ rule, words, sources }: RulebookRow): string {
	return row(code(rule), words, sources.map(({ id }) => code(id)).join(', '));
}

/** One row for each limit, its three sets beside each other. */
function limitRows({ limits }: RulebookRow): string[] {
	const keys = [...new Set(limits.map(({ key }) => key))];
	return keys.map((key) => {
		const sets = SETS.map((set) => limits.find((limit) => limit.key === key && limit.set === set));
		const unit = sets.find((limit) => limit?.unit)?.unit ?? '';
		return row(code(key), ...sets.map(valueOf), unit, sourcesOf(key));
	});
}

function valueOf(limit: RulebookLimit | undefined): string {
	return limit?.when ? `${limit.when} ${limit.value}` : 'off';
}

/** The source of a limit, with its sets where they differ. */
function sourcesOf(key: RulebookLimit['key']): string {
	const bySource = new Map<string, string[]>();
	for (const set of SETS) {
		const source = DEFAULT_LIMITS[set][key]?.source;
		if (source) {
			bySource.set(source, [...(bySource.get(source) ?? []), set]);
		}
	}
	const [only] = bySource.keys();
	return only && bySource.size === 1
		? code(only)
		: [...bySource].map(([source, sets]) => `${code(source)} (${sets.join(', ')})`).join(', ');
}

describe('docs/CLINICAL.md', () => {
	const { rows } = rulebook();

	it('has every rule in the words of the code', () => {
		expect(rowsUnder('The rules')).toEqual(rows.map(ruleRow));
	});

	it('has every limit of every set with its source', () => {
		expect(rowsUnder('The limits')).toEqual(rows.flatMap(limitRows));
	});

	it('has every source with its address and its standing', () => {
		const expected = Object.entries(SOURCES).map(([id, { title, address, status }]) =>
			row(code(id), title, address ?? '', STANDING[status])
		);
		expect(rowsUnder('The sources')).toEqual(expected);
	});

	it('has every calculator with formula, range and source', () => {
		const expected = CALCULATORS.map(({ name, formula, range, source, address, status }) =>
			row(name, formula, range, address ? `[${source}](${address})` : source, STANDING[status])
		);
		expect(rowsUnder('The calculators')).toEqual(expected);
	});

	it('names the symptoms that stop', () => {
		const stopping = SYMPTOMS.filter(
			(symptom) => grades(judge({ symptoms: [symptom] }), 'symptom')[0] === 'stop during'
		);
		const [, named = ''] = /^- These symptoms stop: ([^.]*)\./m.exec(TEXT) ?? [];
		expect(named.split(', ').toSorted()).toEqual(stopping.toSorted());
	});

	it('names the version of the limits and the share that cautions', () => {
		expect(TEXT).toContain(`Version ${DEFAULTS_VERSION} of the limits`);
		expect(TEXT).toContain(`from ${(CAUTION_SHARE.strict ?? 0) * 100} % of the limit on`);
	});
});
