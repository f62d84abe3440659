import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path/posix';
import { parse, type AST } from 'svelte/compiler';
import { describe, expect, it } from 'vitest';

/** Files of the pages and their parts, by their ending. */
function files(ending: string): string[] {
	return readdirSync('src', { recursive: true, encoding: 'utf8' })
		.map((file) => `src/${file.replaceAll('\\', '/')}`)
		.filter((file) => file.endsWith(ending) && !file.includes('/paraglide/'));
}

const sourceOf = (file: string) => readFileSync(file, 'utf8');

/** Every element and component of a template, with what stands around it. */
function walk(
	node: unknown,
	visit: (element: AST.RegularElement | AST.Component, around: unknown[]) => void
) {
	const step = (at: unknown, around: unknown[]): void => {
		if (Array.isArray(at)) {
			at.forEach((each) => step(each, around));
		} else if (at !== null && typeof at === 'object') {
			const { type } = at as { type?: string };
			const element = type === 'RegularElement' || type === 'Component';
			if (element) {
				visit(at as AST.RegularElement, around);
			}
			Object.values(at).forEach((each) => step(each, element ? [...around, at] : around));
		}
	};
	step(node, []);
}

describe('parts', () => {
	const importedBy = (folder: string) =>
		files('.svelte')
			.filter((file) => file.startsWith(folder))
			.flatMap((file) => [...sourceOf(file).matchAll(/components\/ui\/(\w+)\.svelte|'\.\/(\w+)\.svelte/g)])
			.map((match) => match[1] ?? match[2]);

	it('are all on the page of parts, or are a part of one that is', () => {
		const shown = new Set([...importedBy('src/routes/style'), ...importedBy('src/lib/components/ui')]);
		const parts = files('.svelte')
			.filter((file) => file.startsWith('src/lib/components/ui/'))
			.map((file) => file.slice('src/lib/components/ui/'.length, -'.svelte'.length));
		expect(parts.length).toBeGreaterThan(20);
		expect(parts.filter((part) => !shown.has(part))).toEqual([]);
	});
});

describe('forms', () => {
	/** Forms that are not drawn by `components/form`, each with its reason. */
	const OTHERS: Record<string, string> = {
		'src/lib/components/thread/Composer.svelte': 'one line and a draft; over the same formState',
		'src/lib/components/escalations/PhoneForm.svelte': 'a link without a sign-in; checked by linkDeed',
		'src/lib/components/patient-page/OwnVisit.svelte':
			'a link without a sign-in; checked by the deed of the page',
		'src/lib/components/accounts/SignInAndSend.svelte':
			'sends another form on as it was; checked by signInBody',
		'src/lib/components/shell/MorePanel.svelte': 'signing out has nothing to check',
		'src/lib/components/bedside/Bedside.svelte':
			'kept on the device and sent as JSON; checked by sessionBody',
		'src/routes/(app)/admin/messages/+page.svelte':
			'looks something up: it writes nothing, and its address can be kept'
	};
	const drawn = () =>
		files('.svelte').filter(
			(file) => /<form[\s>]/.test(sourceOf(file)) && !file.startsWith('src/lib/components/form/')
		);

	it('are drawn once, and every other one has a reason', () => {
		expect(drawn().toSorted()).toEqual(Object.keys(OTHERS).toSorted());
	});

	/** Controls that stand in no form, or in one that the file alone does not show, each with its reason. */
	const LOOSE: Record<string, string> = {
		'src/lib/components/clearances/LimitFields.svelte': 'drawn by a snippet, within the form of GiveForm',
		'src/lib/components/calculators/Calculator.svelte': 'a sum, which is worked out while it is typed',
		'src/lib/components/escalations/EscalationActions.svelte': 'one of a few moves, which opens its form'
	};

	const CONTROLS =
		/^(Field|TextArea|Choice|DateField|TimeField|NumberField|Input|(Long)?Select|Combobox|Check)$/;

	/** The parts that a file draws, by file, of those that stand in no form of that file. */
	function outsideForms(file: string): Set<string> {
		const imports = new Map(
			[...sourceOf(file).matchAll(/import (\w+) from '([^']+\.svelte)'/g)].map(([, name = '', path = '']) => [
				name,
				path.startsWith('$lib/') ? path.replace('$lib', 'src/lib') : join(dirname(file), path)
			])
		);
		const loose = new Set<string>();
		walk(parse(sourceOf(file), { modern: true }).fragment, ({ name }, around) => {
			if (!around.some((each) => /^((Json|Reason)?Form|form)$/.test((each as AST.Component).name))) {
				loose.add(imports.get(name) ?? name);
			}
		});
		return loose;
	}

	/** The files in which something stands in no form, whichever file draws the form around it. */
	function withoutForm(): string[] {
		const all = files('.svelte').filter((file) => !/components\/(ui|form)\/|routes\/style\//.test(file));
		const loose = new Map(all.map((file) => [file, outsideForms(file)]));
		const bare = new Set(all.filter((file) => /^src\/routes\/.*\/\+/.test(file)));
		for (const user of bare) {
			all.filter((file) => loose.get(user)?.has(file)).forEach((file) => bare.add(file));
		}
		const control = (path: string) => CONTROLS.test(path.split('/').at(-1)?.replace('.svelte', '') ?? '');
		return [...bare].filter((file) => [...(loose.get(file) ?? [])].some(control));
	}

	it('stand around every control by which something is sent', () => {
		expect(withoutForm().toSorted()).toEqual(Object.keys(LOOSE).toSorted());
	});

	it.each(files('.svelte').filter((file) => /<form[^>]*method="POST"/.test(sourceOf(file))))(
		'%s carries a key against being done twice, or signs in or out',
		(file) => {
			const safe =
				/name="key"/.test(sourceOf(file)) || /routes\.sign(Out|InAndSend)\(\)/.test(sourceOf(file));
			expect(safe).toBe(true);
		}
	);

	/** Forms without the check before they are sent, each with its reason. */
	const UNCHECKED: Record<string, string> = {
		'src/lib/components/escalations/TakeForm.svelte': 'one press, and a time that may be left open',
		'src/lib/components/thread/Asked.svelte': 'the composer: the server sees the draft anyway',
		'src/lib/components/thread/ReferralAnswer.svelte': 'accepting is one press; declining is checked',
		'src/routes/(app)/admin/accounts/[id]/+page.svelte': 'boxes to tick',
		'src/routes/(app)/loose-ends/[what]/[id]/+page.svelte':
			'a message is seen to by one press; a text is checked',
		'src/routes/(app)/patients/[id]/clearances/[clearanceId]/+page.svelte': 'a no is seen by one press',
		'src/routes/(public)/invite/[token]/+page.svelte': 'a first page, with a password that the server judges',
		'src/routes/(public)/sign-in/+page.svelte': 'a first page, with a password that the server judges'
	};

	it('say what is wrong before they are sent, by the schema of the server', () => {
		const unchecked = files('.svelte').filter((file) => {
			const forms = [...sourceOf(file).matchAll(/<(Form|ReasonForm|JsonForm)\s[^]*?>\n/g)].map(
				([tag]) => tag
			);
			return (
				forms.some((tag) => !/\bschema=|\{schema\}/.test(tag)) &&
				file !== 'src/lib/components/form/Form.svelte'
			);
		});
		expect(unchecked.toSorted()).toEqual(Object.keys(UNCHECKED).toSorted());
	});

	/** Where a posted form may be read: in the one wrapper, and by the doors that need no sign-in. */
	const READERS = [
		'src/lib/server/http/form-action.ts',
		'src/routes/(patient)/p/[token]/+page.server.ts',
		'src/routes/(phone)/t/[token]/+page.server.ts',
		'src/routes/(public)/sign-in/send/+page.server.ts',
		'src/routes/style/form/+page.server.ts'
	];

	it('are read by the wrapper that checks them with the schema of their area', () => {
		const readers = files('.ts').filter(
			(file) => /\.formData\(\)/.test(sourceOf(file)) && !file.endsWith('.test.ts')
		);
		expect(readers.toSorted()).toEqual(READERS.toSorted());
		for (const file of readers) {
			expect(sourceOf(file), file).toMatch(/superValidate|safeParse/);
		}
	});

	it.each(files('+page.server.ts').filter((file) => /export const actions/.test(sourceOf(file))))(
		'%s checks with the schema that it fills the form by',
		(file) => {
			const source = sourceOf(file);
			const checks = /formAction\(|openFormAction\(|safeParse\(|superValidate\(/.test(source);
			const borrows = /import \{[^}]*\} from '(\.\/|\.\.\/)[^']*(actions|ask-clearance)'/.test(source);
			expect(checks || borrows).toBe(true);
		}
	);
});

describe('numbers', () => {
	const NUMBER = /\btype=\{?["']number["']/;

	it.each([
		['<Input type="number" />', true],
		["<Input type={'number'} />", true],
		['<NumberControl {text} />', false]
	])('%s: %s', (source, found) => {
		expect(NUMBER.test(source)).toBe(found);
	});

	// A browser answers an empty text for what it cannot read, and empty means something else: no limit, no upper end.
	it('are typed into a text, so that what is none is seen and said', () => {
		expect(files('.svelte').filter((file) => NUMBER.test(sourceOf(file)))).toEqual([]);
	});
});

describe('looks', () => {
	const RAW =
		/#[\da-f]{3,8}\b(?!['"]?\s*\))|\b(rgba?|hsla?|oklch|lab)\(|\b(text|bg|border|fill|stroke|decoration)-\[(#|rgb|hsl)/i;
	/** Ids and addresses within a page look like colours; a class or a style does not contain one. */
	const coloursIn = (source: string) =>
		source
			.replace(/(href|id|for|aria-\w+)=["'{`][^"'}`]*["'}`]/g, '')
			.replace(/\{[#/:@]\w+/g, '')
			.split('\n')
			.filter((line) => RAW.test(line));
	const looked = () =>
		[...files('.svelte'), ...files('.ts')].filter(
			(file) =>
				/^src\/(lib\/components|routes)\//.test(file) && !/tokens(\.test)?\.ts$|\.test\.ts$/.test(file)
		);

	it.each([
		'class="bg-[#f4f0e6]"',
		"style:color={'#123'}",
		'style="color: rgb(1 2 3)"',
		'fill="oklch(1 0 0)"'
	])('would notice the colour in %s', (line) => expect(coloursIn(line)).toEqual([line]));

	it('name no colour beside the tokens', () => {
		const raw = looked().flatMap((file) =>
			coloursIn(sourceOf(file)).map((line) => `${file}: ${line.trim()}`)
		);
		expect(raw).toEqual([]);
	});

	it('take their type, corners, distances and durations from the tokens', () => {
		// Widths and columns belong to one layout; what a token carries does not.
		const OWN =
			/\b(text|leading|tracking|rounded(-\w+)?|font|duration|ease|[mp][xytblr]?|gap(-[xy])?|shadow)-\[(?!GrayText|max\(|env\()[^\]]+\]/g;
		const own = looked().flatMap((file) =>
			(sourceOf(file).match(OWN) ?? []).map((each) => `${file}: ${each}`)
		);
		expect(own).toEqual([]);
	});

	/** Hemp is too pale by day to say anything by itself (2.4:1): it decorates beside words, in these places alone. */
	const DECORATED = [
		'src/lib/components/patient-page/PatientShell.svelte',
		'src/lib/components/ui/Aside.svelte',
		'src/lib/components/ui/Badge.svelte',
		'src/lib/components/ui/Notice.svelte'
	];

	it('mark no place, no day and no state with the pale hemp', () => {
		const pale = looked().filter((file) =>
			/\b(border|decoration|bg|outline)-hemp(?!-ink)\b/.test(sourceOf(file))
		);
		expect(pale.toSorted()).toEqual(DECORATED);
	});

	const OUTSIDE_UI = (file: string) => !file.startsWith('src/lib/components/ui/');

	it('underline by the one link', () => {
		expect(
			looked().filter((file) => OUTSIDE_UI(file) && /(?<![\w/])underline\b/.test(sourceOf(file)))
		).toEqual([]);
	});

	it('set words apart by the one line beside them', () => {
		expect(looked().filter((file) => OUTSIDE_UI(file) && /\bborder-l\b/.test(sourceOf(file)))).toEqual([]);
	});

	it('fold by the one part that shows what opens, and opens it on paper', () => {
		expect(looked().filter((file) => OUTSIDE_UI(file) && /<details[\s>]/.test(sourceOf(file)))).toEqual([]);
	});

	/** Controls that one sees and that are not of `components/ui`, each with its reason. */
	const OWN_CONTROLS: Record<string, string> = {
		'src/lib/components/escalations/GradeChoice.svelte':
			'a radio button that a whole row with its mark and meaning covers; look and ring are those of Choice'
	};

	it('draw the control that one types into in one place', () => {
		const seen = files('.svelte').filter((file) => {
			let own = false;
			walk(parse(sourceOf(file), { modern: true }).fragment, (element) => {
				const said = sourceOf(file).slice(element.start, element.end).split('>')[0] ?? '';
				own ||=
					['input', 'select', 'textarea'].includes(element.name) && !/type="hidden"|\shidden\b/.test(said);
			});
			return own && OUTSIDE_UI(file);
		});
		expect(seen.toSorted()).toEqual(Object.keys(OWN_CONTROLS).toSorted());
	});

	it('are not written twice: a long run of classes stands in one place', () => {
		const places = new Map<string, Set<string>>();
		for (const file of looked()) {
			for (const [, classes = ''] of sourceOf(file).matchAll(/["'`]([^"'`\n{}]{60,})["'`]/g)) {
				const words = classes.trim().split(/\s+/);
				if (words.length >= 6 && words.every((word) => /^[-!\w:[\]().%/&>=,*#+@]+$/.test(word))) {
					const key = words.toSorted().join(' ');
					places.set(key, (places.get(key) ?? new Set()).add(file));
				}
			}
		}
		expect(
			[...places].filter(([, where]) => where.size > 1).map(([key, where]) => [key, [...where]])
		).toEqual([]);
	});
});

describe('icons', () => {
	/** Whether the element around an icon has words that are seen: in itself, or in a part of it that is not hidden. */
	function hasWords(node: unknown): boolean {
		if (Array.isArray(node)) {
			return node.some(hasWords);
		}
		if (node === null || typeof node !== 'object') {
			return false;
		}
		const { type } = node as { type?: string };
		if (
			type === 'RegularElement' &&
			/sr-only/.test(JSON.stringify((node as AST.RegularElement).attributes))
		) {
			return false;
		}
		const { fragment, consequent, data } = node as Record<string, unknown>;
		return type === 'ExpressionTag' || type === 'RenderTag'
			? true
			: type === 'Text'
				? String(data).trim() !== ''
				: hasWords((fragment as AST.Fragment | undefined)?.nodes) ||
					hasWords((consequent as AST.Fragment | undefined)?.nodes);
	}

	function besideWords(source: string): { icons: number; alone: number } {
		let [icons, alone] = [0, 0];
		walk(parse(source, { modern: true }).fragment, (element, around) => {
			if (element.name === 'Icon') {
				icons += 1;
				const nearest = around.at(-1) as AST.RegularElement | undefined;
				alone += hasWords(nearest?.fragment.nodes) ? 0 : 1;
			}
		});
		return { icons, alone };
	}

	it.each([
		['<a><Icon icon={x} /></a>', 1],
		['<a><Icon icon={x} /><span class="sr-only">Ward</span></a>', 1],
		['<a><Icon icon={x} />Ward</a>', 0],
		['<a>{#if y}<Icon icon={x} />{/if}<span>{label}</span></a>', 0]
	])('stand alone in %s: %d', (source, alone) => {
		expect(besideWords(source).alone).toBe(alone);
	});

	/** What stands on a control without a word, because every browser draws the same there. */
	const OF_THE_TRADE: Record<string, string> = {
		'src/lib/components/ui/Combobox.svelte': 'the arrow of a list that opens, as on a select'
	};

	it('never stand without a word, and are in use', () => {
		const counted = files('.svelte')
			.filter((file) => /<Icon\b/.test(sourceOf(file)))
			.map((file) => [file, besideWords(sourceOf(file))] as const);
		const alone = counted.filter((counts) => counts[1].alone > 0).map(([file]) => file);
		expect(alone).toEqual(Object.keys(OF_THE_TRADE));
		expect(counted.filter(([file]) => !file.startsWith('src/routes/style/')).length).toBeGreaterThan(2);
	});

	/** Drawings that no library has, each with what it shows; plots and ropes are rooms of their own. */
	const DRAWN: Record<string, string> = {
		'src/lib/components/clearances/ArmFigure.svelte': 'an arm raised by so many degrees',
		'src/lib/components/clock/ChainRope.svelte': 'the rope that a call goes along',
		'src/lib/components/shell/Connection.svelte': 'a strand, whole or parted',
		'src/lib/components/ui/GradeShape.svelte': 'the shapes of urgency',
		'src/lib/components/lane/Lane.svelte': 'the corridor and what hangs in it',
		'src/lib/components/lane/LaneModels.svelte': 'the same for all who are at one level',
		'src/lib/components/lane/LaneRope.svelte': 'the rope, laid to a level'
	};

	it('are not drawn by hand', () => {
		const drawn = files('.svelte').filter(
			(file) =>
				!/^src\/lib\/components\/(rope|plot)\//.test(file) &&
				/<svg[\s>]/.test(sourceOf(file).replace(/<!--[\s\S]*?-->/g, ''))
		);
		expect(drawn.toSorted()).toEqual(Object.keys(DRAWN).toSorted());
	});

	it('come by the one part that hides them from screen readers', () => {
		const direct = files('.svelte').filter((file) => {
			const names = [...sourceOf(file).matchAll(/import (\w+) from '@lucide\/svelte/g)].map(
				([, name]) => name
			);
			return names.some((name) => new RegExp(`<${name}\\b`).test(sourceOf(file)));
		});
		expect(direct).toEqual([]);
	});
});
