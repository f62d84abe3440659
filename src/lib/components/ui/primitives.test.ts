import { createRawSnippet } from 'svelte';
import { render } from 'svelte/server';
import { describe, expect, it } from 'vitest';
import Button from './Button.svelte';
import Field from './Field.svelte';
import type { FieldControl } from './field-control';
import GradeMark from './GradeMark.svelte';
import NumberField from './NumberField.svelte';
import Notice from './Notice.svelte';
import Person from './Person.svelte';
import Table from './Table.svelte';
import Time from './Time.svelte';

const words = (text: string) => createRawSnippet(() => ({ render: () => `<span>${text}</span>` }));
const control = createRawSnippet<[FieldControl]>((given) => ({
	render: () => {
		const { id, required, ...aria } = given();
		const attributes = Object.entries(aria).map(([name, value]) => (value ? `${name}="${value}"` : ''));
		return `<input id="${id}" ${required ? 'required' : ''} ${attributes.join(' ')}>`;
	}
}));

describe('Button', () => {
	it('submits nothing unless it is told to', () => {
		expect(render(Button, { props: { children: words('Ask') } }).body).toContain('type="button"');
		expect(render(Button, { props: { type: 'submit', children: words('Ask') } }).body).toContain(
			'type="submit"'
		);
	});

	it('is a link where it has an address', () => {
		const { body } = render(Button, { props: { href: '/ward', children: words('Ward') } });
		expect(body).toMatch(/<a [^>]*href="\/ward"/);
		expect(body).not.toContain('<button');
	});

	it('keeps its word and says that it waits while it is on its way', () => {
		const { body } = render(Button, { props: { pending: true, children: words('Clear') } });
		expect(body).toContain('aria-disabled="true"');
		expect(body).toMatch(/Clear.*Please wait/s);
	});

	it.each(['high', 'medium', 'low'] as const)('raises and takes a %s call in the colour of it', (grade) => {
		const { body } = render(Button, { props: { variant: 'alarm', grade, children: words('I take it') } });
		expect([...body.matchAll(/\bbg-(high|medium|low)\b/g)].map((match) => match[1])).toEqual([grade]);
	});
});

describe('Field', () => {
	it('ties label, hint and error to the control and says that it is needed', () => {
		const { body } = render(Field, {
			props: {
				label: 'Bed',
				id: 'bed',
				hint: 'As on the door.',
				error: 'Bed: T40 is over T30.',
				required: true,
				children: control
			}
		});
		expect(body).toContain('for="bed"');
		expect(body).toContain('aria-describedby="bed-hint bed-error"');
		expect(body).toContain('aria-invalid="true"');
		expect(body).toContain('needed');
		expect(body).toMatch(/id="bed-error" role="alert"[^>]*>.*T40 is over T30/s);
	});

	it.each([null, [], ''])('is not wrong with %j as its error', (error) => {
		const { body } = render(Field, { props: { label: 'Bed', error, children: control } });
		expect(body).not.toContain('aria-invalid');
		expect(body).not.toContain('aria-describedby');
	});
});

describe('NumberField', () => {
	it.each([
		[false, 'numeric'],
		[true, 'decimal']
	])('with decimals %s asks the phone for %s keys and shows the unit', (decimals, keys) => {
		const { body } = render(NumberField, {
			props: { label: 'Systolic', unit: 'mmHg', value: '12,5', decimals }
		});
		expect(body).toContain(`inputmode="${keys}"`);
		expect(body).toContain('value="12,5"');
		expect(body).toContain('mmHg');
	});

	it('keeps what is no number as it was typed, with what is wrong and the unit for whoever hears it', () => {
		const error = 'Pulse: “1e” is no number.';
		const props = { label: 'Pulse', name: 'hr', unit: 'beats/min', value: '1e', error };
		const { body } = render(NumberField, { props });
		expect(body).toMatch(/type="text"[^>]*value="1e"/);
		expect(body).toMatch(/aria-describedby="\S+-unit \S+-error"/);
		expect(body).toContain(error);
	});
});

describe('what is told by colour', () => {
	it.each([
		['high', 'High'],
		['medium', 'Medium'],
		['low', 'Low']
	] as const)('says the grade %s in words too', (grade, word) => {
		expect(render(GradeMark, { props: { grade } }).body).toContain(word);
	});

	it.each([
		['medical', 'medical'],
		['nursing', 'nursing'],
		['therapy', 'therapy'],
		['patient', 'patient']
	] as const)('says the discipline %s in words too', (strand, word) => {
		expect(render(Person, { props: { name: 'R. Ferris', strand } }).body).toContain(word);
	});

	it.each([
		['stop', 'alert'],
		['error', 'alert'],
		['caution', 'status']
	] as const)('announces a %s as %s', (kind, role) => {
		expect(render(Notice, { props: { kind } }).body).toContain(`role="${role}"`);
	});
});

describe('Table', () => {
	it('names itself and tells by which column it is sorted', () => {
		const { body } = render(Table, {
			props: {
				caption: 'Patients',
				columns: [
					{ key: 'bed', label: 'Bed', sortable: true },
					{ key: 'name', label: 'Name' }
				],
				sort: { by: 'bed', direction: 'descending' },
				children: createRawSnippet(() => ({ render: () => '<tr><td>T4</td><td>Marta Lisowska</td></tr>' }))
			}
		});
		expect(body).toMatch(/<caption[^>]*>Patients/);
		expect(body.match(/aria-sort="descending"/g)).toHaveLength(1);
		expect(body.match(/<button/g)).toHaveLength(1);
	});
});

describe('Time', () => {
	const at = Date.UTC(2025, 11, 1, 14, 2);

	it('shows the hospital’s wall time and keeps the instant for machines', () => {
		const reader = { zone: 'Europe/Dublin', now: Date.UTC(2025, 6, 1, 12, 30) };
		const { body } = render(Time, { props: { at: Date.UTC(2025, 6, 1, 11, 5), reader } });
		expect(body).toMatch(/datetime="2025-07-01T11:05:00.000Z"[^>]*>12:05</);
	});

	it('refuses to guess a zone', () => {
		expect(() => render(Time, { props: { at } }).body).toThrow(/no reader is known/);
	});
});
