// @vitest-environment jsdom
import { expect, it } from 'vitest';
import { unfold } from './unfold';

it('opens every fold around an element, and no other', () => {
	document.body.innerHTML = `
		<details id="outer"><summary>A</summary>
			<details id="inner"><summary>B</summary><form></form></details>
			<details id="beside"><summary>C</summary></details>
		</details>`;
	unfold(document.querySelector('form') ?? document.body);
	const open = [...document.querySelectorAll('details')].filter((fold) => fold.open).map(({ id }) => id);
	expect(open).toEqual(['outer', 'inner']);
});
