/**
 * Makes an element. Text is only ever set as text, so that nothing that came by message can become markup.
 * @template {keyof HTMLElementTagNameMap} Tag
 * @param {Tag} tag
 * @param {Record<string, string>} attributes
 * @param {...(Node | string)} children
 * @returns {HTMLElementTagNameMap[Tag]}
 */
export function el(tag, attributes, ...children) {
	const element = document.createElement(tag);
	for (const [name, value] of Object.entries(attributes)) {
		element.setAttribute(name, value);
	}
	element.append(...children);
	return element;
}

/**
 * The element with this id, which the page brings.
 * @param {string} id
 */
export function byId(id) {
	const found = document.getElementById(id);
	if (!found) {
		throw new Error(`The page has no element #${id}.`);
	}
	return found;
}

/**
 * A text whose http addresses are links that open beside this page.
 * @param {string} text
 * @returns {(Node | string)[]}
 */
export function withLinks(text) {
	return text.split(/(https?:\/\/[^\s<>"]*[^\s<>".,;:!?)\]])/).map((part, index) => {
		const isLink = index % 2 === 1;
		return isLink ? el('a', { href: part, target: '_blank', rel: 'noopener noreferrer' }, part) : part;
	});
}

const TIME = new Intl.DateTimeFormat('en-IE', { hour: '2-digit', minute: '2-digit' });
const DAY_AND_TIME = new Intl.DateTimeFormat('en-IE', {
	weekday: 'short',
	day: 'numeric',
	month: 'short',
	hour: '2-digit',
	minute: '2-digit'
});

/**
 * Today's instants by their time, others with their day.
 * @param {string} at RFC 3339
 */
export function timeOf(at) {
	const date = new Date(at);
	return date.toDateString() === new Date().toDateString() ? TIME.format(date) : DAY_AND_TIME.format(date);
}

/**
 * Puts rows into this order without touching those that stand right already. Nothing moves while somebody types in
 * the list or has the keyboard on a row.
 * @param {HTMLElement} list
 * @param {HTMLElement[]} rows
 */
export function arrange(list, rows) {
	const isUsed = list.contains(document.activeElement);
	rows.forEach((row, index) => {
		if (list.children[index] === row || (isUsed && row.parentElement === list)) {
			return;
		}
		list.insertBefore(row, list.children[index] ?? null);
	});
}
