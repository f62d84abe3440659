import ChevronUp from '@lucide/svelte/icons/chevron-up';
import { createRawSnippet, type Component } from 'svelte';
import { render } from 'svelte/server';
import Aside from '../../src/lib/components/ui/Aside.svelte';
import Badge from '../../src/lib/components/ui/Badge.svelte';
import Button from '../../src/lib/components/ui/Button.svelte';
import Check from '../../src/lib/components/ui/Check.svelte';
import Chip from '../../src/lib/components/ui/Chip.svelte';
import Choice from '../../src/lib/components/ui/Choice.svelte';
import Fact from '../../src/lib/components/ui/Fact.svelte';
import Facts from '../../src/lib/components/ui/Facts.svelte';
import Field from '../../src/lib/components/ui/Field.svelte';
import GradeMark from '../../src/lib/components/ui/GradeMark.svelte';
import GradeShape from '../../src/lib/components/ui/GradeShape.svelte';
import Icon from '../../src/lib/components/ui/Icon.svelte';
import Input from '../../src/lib/components/ui/Input.svelte';
import Link from '../../src/lib/components/ui/Link.svelte';
import Notice from '../../src/lib/components/ui/Notice.svelte';
import NumberControl from '../../src/lib/components/ui/NumberControl.svelte';
import NumberField from '../../src/lib/components/ui/NumberField.svelte';
import NumberPad from '../../src/lib/components/ui/NumberPad.svelte';
import PageHead from '../../src/lib/components/ui/PageHead.svelte';
import Person from '../../src/lib/components/ui/Person.svelte';
import ProblemNotice from '../../src/lib/components/ui/ProblemNotice.svelte';
import Progress from '../../src/lib/components/ui/Progress.svelte';
import Reveal from '../../src/lib/components/ui/Reveal.svelte';
import Select from '../../src/lib/components/ui/Select.svelte';
import Skeleton from '../../src/lib/components/ui/Skeleton.svelte';
import SubNav from '../../src/lib/components/ui/SubNav.svelte';
import Table from '../../src/lib/components/ui/Table.svelte';
import Tabs from '../../src/lib/components/ui/Tabs.svelte';
import TextArea from '../../src/lib/components/ui/TextArea.svelte';
import Time from '../../src/lib/components/ui/Time.svelte';

const children = createRawSnippet(() => ({ render: () => '<span>words</span>' }));
const either = [false, true];
const grade = ['high', 'medium', 'low'];
const options = [{ value: 'a', label: 'A', hint: 'first' }];

/** A part with the least that it needs to be drawn, and the properties by which it looks different. */
type Looks = { part: unknown; props?: object; looks?: Record<string, readonly unknown[]> };

export const LOOKS: Record<string, Looks> = {
	Aside: { part: Aside, props: { children }, looks: { tone: ['ink', 'doubt', 'hemp', 'rule', 'stop'] } },
	Badge: { part: Badge, props: { children }, looks: { variant: ['plain', 'strong', 'hemp'] } },
	Button: {
		part: Button,
		props: { children },
		looks: {
			variant: ['main', 'quiet', 'on-ground', 'alarm', 'link'],
			size: ['desk', 'phone', 'take'],
			grade
		}
	},
	Check: { part: Check, props: { label: 'A', hint: 'B' } },
	Chip: { part: Chip, props: { children }, looks: { pressed: either, narrow: either } },
	Choice: { part: Choice, props: { label: 'A', name: 'a', options } },
	Fact: { part: Fact, props: { term: 'A', aside: 'B', children } },
	Facts: { part: Facts, props: { children } },
	Field: {
		part: Field,
		props: { label: 'A', hint: 'B', error: 'C', required: true, children },
		looks: { place: ['above', 'beside', 'aloud'] }
	},
	GradeMark: { part: GradeMark, looks: { grade, over: either } },
	GradeShape: { part: GradeShape, looks: { grade, over: either, plain: either, size: ['text', 'mark'] } },
	Icon: { part: Icon, props: { icon: ChevronUp } },
	Input: { part: Input, looks: { size: ['desk', 'phone'] } },
	Link: {
		part: Link,
		props: { href: '/', children },
		looks: { variant: ['text', 'row', 'quiet', 'quiet-row', 'place'] }
	},
	Notice: { part: Notice, looks: { kind: ['note', 'caution', 'stop', 'error'] } },
	NumberControl: {
		part: NumberControl,
		props: { id: 'a', text: '1', unit: 'mmHg', ontyped: () => {} },
		looks: { size: ['dose', 'reading', 'sum'], stop: either }
	},
	NumberField: { part: NumberField, props: { label: 'A', value: '1', hint: 'B', unit: 'mmHg' } },
	NumberPad: { part: NumberPad, props: { label: 'A', ondone: () => {} } },
	PageHead: { part: PageHead, props: { children } },
	Person: { part: Person, props: { name: 'A', strand: 'medical', role: 'B' } },
	ProblemNotice: { part: ProblemNotice, props: { problem: { title: 'A', text: 'B', signIn: true } } },
	Progress: { part: Progress, props: { label: 'A' }, looks: { bare: either, value: [null, 1] } },
	Reveal: {
		part: Reveal,
		props: { label: 'A', children },
		looks: { printed: either, tone: ['plain', 'quiet', 'button'] }
	},
	Select: { part: Select, props: { options }, looks: { fit: either } },
	Skeleton: { part: Skeleton },
	SubNav: {
		part: SubNav,
		props: { label: 'A', places: [{ href: '/', label: 'B', count: 1 }], current: '/' }
	},
	Table: {
		part: Table,
		props: { caption: 'A', columns: [{ key: 'a', label: 'A', sortable: true }], children }
	},
	Tabs: { part: Tabs, props: { label: 'A', tabs: [{ value: 'a', label: 'A', count: 1 }], panel: children } },
	TextArea: { part: TextArea, looks: { size: ['line', 'lines'] } },
	Time: { part: Time, props: { at: 0, reader: { zone: 'Europe/Dublin', now: 0 } } }
};

const PLACED = 'placed-by-the-caller';

/** Each combination of the choices, the last one turning fastest. */
function combinations(choices: Record<string, readonly unknown[]>): object[] {
	return Object.entries(choices).reduce<object[]>(
		(all, [name, values]) => all.flatMap((props) => values.map((value) => ({ ...props, [name]: value }))),
		[{}]
	);
}

/**
 * The classes of a part as it is drawn: of the element that takes the caller's, and of all of it.
 *
 * @throws Error when the part is not known here, or does not put the caller's class anywhere
 */
export function lookedLike(name: string, choices: Record<string, readonly unknown[]>) {
	const known = LOOKS[name];
	if (!known) {
		throw new Error(
			`${name} is given a class, and tests/unit/looks.ts does not know how to draw it: add it.`
		);
	}
	return combinations(choices).flatMap((look) => {
		const props = { ...known.props, ...look, class: PLACED };
		const { body } = render(known.part as Component<Record<string, unknown>>, { props });
		const all = [...body.matchAll(/\sclass="([^"]*)"/g)].map(([, text = '']) =>
			text.replaceAll('&amp;', '&')
		);
		const roots = all.filter((text) => text.split(' ').includes(PLACED));
		if (roots.length === 0) {
			throw new Error(`${name} puts the class of its caller nowhere.`);
		}
		return roots.map((root) => ({ root: root.replace(PLACED, ''), all }));
	});
}
