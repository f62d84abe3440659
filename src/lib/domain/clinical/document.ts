/**
 * docs/CLINICAL.md, made from the registry and the tables that judge. `npm run docs:clinical` writes it, and a test
 * compares it, so that the document cannot tell another story than the code.
 */
import { ACTIVITIES } from '../bedside/activities/activities';
import type { Activity } from '../bedside/activities/activity';
import { SETS, type LimitKey } from '../bedside/codes';
import { LEVEL_BANDS, LEVEL_BANDS_SOURCE } from '../bedside/levels';
import { SOURCES, type SourceStatus } from '../bedside/limits/sources';
import { DEFAULT_LIMITS, DEFAULTS_VERSION } from '../bedside/limits/table';
import { rulebook, type RulebookLimit, type RulebookRow } from '../bedside/rulebook';
import { sternalBans } from '../bedside/sternum';
import { CALCULATORS } from '../calculators/rulebook';
import { CAUTIONS } from './cautions';
import { ADVICE_FIGURES } from './figures';
import { CHECKS, HOW_TO_READ, OWN_FIGURES, PRECAUTIONS_LEAD } from './lists';

/** How well a source is known, in the words of the document. */
export const STANDING: Record<SourceStatus, string> = {
	published: 'published',
	secondary: 'secondary',
	memory: 'from memory',
	'common-practice': 'common practice'
};

/** The whole document as Markdown. */
export function clinicalDocument(): string {
	const { rows } = rulebook();
	return `${[
		'# Clinical rules, limits and their sources',
		`<!-- Made by \`npm run docs:clinical\` from the tables of the code; not written by hand. -->`,
		'What the product makes of readings, so that a clinician can compare it line by line with local policy. Nothing here is a clinical order. The product shows findings; a person decides, under the hospital’s own policy. A signed-in person reads the same at `/rules`.',
		`Version ${DEFAULTS_VERSION} of the limits.`,
		section('Cautions', bullets(CAUTIONS)),
		section('How to read it', bullets(HOW_TO_READ)),
		section('The rules', table(['rule', 'what it says', 'version', 'rests on'], rows.map(ruleCells))),
		'Rules without a number have no row in the next table.',
		section(
			'The limits',
			table(['limit', ...SETS, 'unit', 'version', 'source', 'standing'], rows.flatMap(limitCells))
		),
		section('The levels', levels()),
		section('The activities', activities()),
		section('Sternal precautions', precautions()),
		section('The calculators', calculators()),
		section('The sources', sources()),
		section('Check values', checks()),
		section('Figures beside the rules', adviceFigures()),
		section('Figures that are the product’s own', ownFigures())
	].join('\n\n')}\n`;
}

const code = (text: string) => `\`${text}\``;
const bullets = (lines: readonly string[]) => lines.map((line) => `- ${line}`).join('\n');
const section = (heading: string, body: string) => `## ${heading}\n\n${body}`;
const row = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;

function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
	return [row(head), row(head.map(() => '---')), ...rows.map(row)].join('\n');
}

function ruleCells({ rule, words, sources }: RulebookRow): string[] {
	const rests = sources.map(({ id, status }) =>
		id === status ? code(id) : `${code(id)} (${STANDING[status]})`
	);
	return [code(rule), words, DEFAULTS_VERSION, rests.join(', ')];
}

/** One row for each limit of a rule, its three sets beside each other. */
function limitCells({ limits }: RulebookRow): string[][] {
	const keys = [...new Set(limits.map(({ key }) => key))];
	return keys.map((key) => {
		const sets = SETS.map((set) => limits.find((limit) => limit.key === key && limit.set === set));
		const unit = sets.find((limit) => limit?.unit)?.unit ?? '';
		const values = sets.map((limit) => (limit?.when ? `${limit.when} ${limit.value}` : 'off'));
		const version = [...new Set(sets.flatMap((limit) => limit?.version ?? []))].join(', ');
		return [
			code(key),
			...values,
			unit,
			version,
			sourcesOf(key),
			standingOf(sets.filter((limit) => limit?.when))
		];
	});
}

/** How well a limit is known, with its sets where they differ; what nobody published is a figure of our own. */
function standingOf(sets: readonly (RulebookLimit | undefined)[]): string {
	const words = (limit: RulebookLimit | undefined) =>
		limit?.status === 'common-practice'
			? '**our own figure**, common practice'
			: STANDING[limit?.status ?? 'common-practice'];
	const said = [...new Set(sets.map(words))];
	return said
		.map((each) => {
			const of = sets.filter((limit) => words(limit) === each).map((limit) => limit?.set);
			return said.length === 1 ? each : `${each} (${of.join(', ')})`;
		})
		.join(', ');
}

/** The source of a limit, with its sets where they differ. */
function sourcesOf(key: LimitKey): string {
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

function levels(): string {
	const standing = STANDING[SOURCES[LEVEL_BANDS_SOURCE].status];
	const rows = Object.values(LEVEL_BANDS).map(({ level, from, to, gist }) => [
		`${level}`,
		`${from} to ${to}`,
		gist
	]);
	return [
		`A band holds its lower end and not its upper, except the last. Bands: \`${LEVEL_BANDS_SOURCE}\`, ${standing}.`,
		table(['level', 'METs', 'gist'], rows)
	].join('\n\n');
}

function activities(): string {
	const rows = ACTIVITIES.map((activity) => [
		code(activity.code),
		activity.name,
		activity.phase === 'outpatient' ? 'gym' : `${activity.level}`,
		activity.mets.join(' to '),
		clearanceOf(activity),
		activity.needs.join('; ').toLowerCase(),
		activity.dose.words,
		STANDING[SOURCES[activity.source].status]
	]);
	return [
		'Usual doses. A unit may word name, dose and lines anew and ask for more first; level, energy, clearances and what is needed first stay. How it is done, what to watch and what never to do stand beside each activity at the bedside and in `src/lib/domain/bedside/activities/`.',
		table(
			['code', 'activity', 'level', 'METs', 'clearance', 'needs first', 'usual dose', 'standing of the dose'],
			rows
		)
	].join('\n\n');
}

function clearanceOf({ clearance, heldBy }: Activity): string {
	return clearance ? code(clearance) : heldBy ? `unless ${code(heldBy)} is held` : 'none';
}

function precautions(): string {
	return [PRECAUTIONS_LEAD, bullets(sternalBans())].join('\n\n');
}

function calculators(): string {
	const rows = CALCULATORS.map(({ name, formula, range, source, address, status }) => [
		name,
		formula,
		range,
		address ? `[${source}](${address})` : source,
		STANDING[status]
	]);
	return [
		'They estimate for a clinician who decides. Outside the range that a formula was made for, the number is shown and marked. Pages show results rounded; nothing is rounded before it is judged. Functions: `src/lib/domain/calculators`.',
		table(['calculator', 'formula', 'made for', 'source', 'standing'], rows)
	].join('\n\n');
}

function sources(): string {
	const rows = Object.entries(SOURCES).map(([id, { title, address, status }]) => [
		code(id),
		title,
		address ?? '',
		STANDING[status]
	]);
	return [
		'*Published*: read at the address. *Secondary*: seen only in somebody’s notes of the primary source. *From memory*: textbook knowledge that nobody has looked up again. *Common practice*: there is no published source. **Whatever is not *published* has to be checked against the primary source before clinical use.**',
		table(['name', 'title', 'address', 'standing'], rows)
	].join('\n\n');
}

function checks(): string {
	const rows = CHECKS.map(({ what, values, tests }) => [what, values, tests.map(code).join(', ')]);
	return [
		'What the calculators and rules are tested against. *Computed* means: worked out from the published formula, independently of the code.',
		table(['what', 'check values', 'tests'], rows)
	].join('\n\n');
}

function adviceFigures(): string {
	const rows = ADVICE_FIGURES.map(({ figure, source, status, path }) => [
		figure,
		source,
		STANDING[status],
		code(path)
	]);
	return [
		'What advice and warnings rest on that are not response rules.',
		table(['figure', 'source', 'standing', 'where'], rows)
	].join('\n\n');
}

function ownFigures(): string {
	return [
		'No published source. Each needs the hospital’s consent before clinical use.',
		table(
			['figure', 'where'],
			OWN_FIGURES.map(({ figure, path }) => [figure, code(path)])
		)
	].join('\n\n');
}
