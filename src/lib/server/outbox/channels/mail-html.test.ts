import { describe, expect, it } from 'vitest';
import { htmlOf } from './mail-html';

const inside = (text: string) => /<body>\n([\s\S]*)\n<\/body>/.exec(htmlOf(text, 'en'))?.[1];

describe('htmlOf', () => {
	it('says which language it is in', () => {
		expect(htmlOf('Su cita.', 'es')).toContain('<html lang="es">');
	});

	it('keeps paragraphs and lines', () => {
		expect(inside('One.\n\nTwo,\nstill two.\n\n\nThree.\n')).toBe(
			'<p>One.</p>\n<p>Two,<br>still two.</p>\n<p>Three.</p>'
		);
	});

	it('makes links of addresses, and of nothing else', () => {
		expect(inside('Open https://ropewalk.example/t/a?b=1&c=2 now, not javascript:alert(1)')).toBe(
			'<p>Open <a href="https://ropewalk.example/t/a?b=1&amp;c=2">https://ropewalk.example/t/a?b=1&amp;c=2</a> ' +
				'now, not javascript:alert(1)</p>'
		);
	});

	it.each([
		['<script>alert(1)</script>', '<p>&lt;script&gt;alert(1)&lt;/script&gt;</p>'],
		['"quoted" & more', '<p>&quot;quoted&quot; &amp; more</p>'],
		[
			'https://a.example/"onclick="x',
			'<p><a href="https://a.example/">https://a.example/</a>&quot;onclick=&quot;x</p>'
		]
	])('escapes %j', (text, html) => {
		expect(inside(text)).toBe(html);
	});
});
