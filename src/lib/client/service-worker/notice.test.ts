import { describe, expect, it } from 'vitest';
import { readNotice } from './notice';

const ORIGIN = 'https://ropewalk.saltmarsh.example';

describe('a message that was pushed', () => {
	it('is shown with its words, and opens its page', () => {
		const text = JSON.stringify({
			...{ title: 'Ropewalk HIGH', body: 'Tern Ward, bed 4.' },
			...{ url: `${ORIGIN}/t/q7Zr2LxV0aYd8KcM3nTfPw`, tag: 'a1' }
		});
		expect(readNotice(text, ORIGIN)).toEqual(JSON.parse(text));
	});

	it.each(['https://evil.example/t/a', '//evil.example/', 'javascript:alert(1)', 'data:text/html,a', 7])(
		'opens no other page: %s',
		(url) => {
			const notice = readNotice(JSON.stringify({ title: 'A', url }), ORIGIN);
			expect(notice.url).toBe(`${ORIGIN}/loose-ends`);
		}
	);

	it.each([null, '', '{', '[]', 'null', '"a"', '{"title":7}'])('shows something for %j', (text) => {
		expect(readNotice(text, ORIGIN)).toEqual({
			...{ title: 'Ropewalk', body: '', tag: '', url: `${ORIGIN}/loose-ends` }
		});
	});
});
