import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { limitLines } from '$lib/components/rules/lines';
import { STATUS_WORDS } from '$lib/components/rules/activity-words';
import { ACTIVITIES } from '$lib/domain/bedside/activities/activities';
import { SETS } from '$lib/domain/bedside/codes';
import { SOURCES } from '$lib/domain/bedside/limits/sources';
import { DEFAULTS_VERSION } from '$lib/domain/bedside/limits/table';
import { rulebook } from '$lib/domain/bedside/rulebook';
import { CALCULATORS } from '$lib/domain/calculators/rulebook';
import { CAUTIONS } from '$lib/domain/clinical/cautions';
import { CHECKS, OWN_FIGURES } from '$lib/domain/clinical/lists';
import { signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';

/** The page 'Rules and sources' as it is served: everything that judges stands on it, with where it comes from. */
let product: Product;
let page: string;

beforeAll(async () => {
	product = await startProduct();
	const { cookie } = await signInAs(product.url, 'nurse');
	const response = await fetch(`${product.url}/rules`, {
		headers: { cookie: cookie ?? '', accept: 'text/html' }
	});
	expect(response.status).toBe(200);
	page = textOf(await response.text());
});
afterAll(() => product?.stop());

const ENTITIES: Record<string, string> = {
	'&amp;': '&',
	'&lt;': '<',
	'&gt;': '>',
	'&quot;': '"',
	'&#39;': "'"
};

/** What a reader sees of the HTML, in its order, with one space between words. */
function textOf(html: string): string {
	return html
		.replace(/<(script|style|svg)\b.*?<\/\1>/gs, ' ')
		.replace(/<!--.*?-->/gs, '')
		.replace(/<[^>]+>/g, ' ')
		.replace(/&(amp|lt|gt|quot|#39);/g, (entity) => ENTITIES[entity] ?? entity)
		.replace(/\s+/g, ' ');
}

/** What stands between a rule's own words and the next rule's. */
function partOf(rule: string): string {
	const { rows } = rulebook();
	const at = rows.findIndex((row) => row.rule === rule);
	const from = page.indexOf(rows[at]?.words ?? '');
	const next = rows[at + 1]?.words;
	return page.slice(from, next ? page.indexOf(next) : page.indexOf('Levels and activities', from));
}

describe('the page of rules and sources', () => {
	it.each(rulebook().rows.map((row) => [row.rule, row] as const))('says of %s all there is', (rule, row) => {
		expect(page).toContain(row.words);
		const part = partOf(rule);
		for (const { label, values, versions, own, sources } of limitLines(row.limits)) {
			const said = [label, ...SETS.map((set) => values[set]), ...versions, ...own, ...sources];
			expect(said.filter((words) => !part.includes(words))).toEqual([]);
		}
		// Whether a rule has numbers or none: its version, and each source with one of the four words.
		expect(part).toContain(`version ${DEFAULTS_VERSION}`);
		for (const { id, title, status } of row.sources) {
			expect(part).toContain(id === 'common-practice' ? title : `${title} · ${STATUS_WORDS[status]()}`);
		}
	});

	it('names every source with how well it is known', () => {
		const list = page.slice(page.lastIndexOf('Published: read at the address.'));
		const lines = Object.values(SOURCES).map(({ title, status }) => `${title} · ${STATUS_WORDS[status]()}`);
		expect(lines.filter((line) => !list.includes(line))).toEqual([]);
		expect(Object.values(STATUS_WORDS).map((words) => words())).toEqual([
			'published',
			'secondary',
			'from memory',
			'common practice'
		]);
	});

	it('lists every activity, calculator, check and figure of the product itself, and the cautions', () => {
		const said = [
			...ACTIVITIES.map(({ name }) => name),
			...CALCULATORS.flatMap(({ name, formula, source }) => [name, formula, source]),
			...CHECKS.flatMap(({ what, values }) => [what, values]),
			...OWN_FIGURES.map(({ figure }) => figure),
			...CAUTIONS
		];
		expect(said.filter((words) => !page.includes(words.replace(/\s+/g, ' ')))).toEqual([]);
	});
});
