import { arrange, byId, el, timeOf } from './elements.js';

/**
 * @typedef {{ id: string, at: string, payload: { title?: string, body?: string, url?: string } }} Notice
 * @typedef {{ id: string, owner: string, gone: boolean, notices: Notice[] }} Device
 */

/** @type {Map<string, { element: HTMLDetailsElement, last: string }>} */
const rows = new Map();

/**
 * Shows the devices with their notices, the one with the newest notice first. What is open stays open.
 * @param {Device[]} devices
 */
export function showNotices(devices) {
	byId('notices-empty').hidden = devices.length > 0;
	const sorted = [...devices].sort((a, b) => newestOf(b).localeCompare(newestOf(a)));
	const shown = new Set(devices.map(({ id }) => id));
	for (const [id, { element }] of rows) {
		if (!shown.has(id)) {
			element.remove();
			rows.delete(id);
		}
	}
	arrange(byId('notice-list'), sorted.map(updateRow));
}

/** @param {Device} device */
function newestOf({ notices }) {
	return notices.at(-1)?.at ?? '';
}

/** @param {Device} device */
function updateRow(device) {
	const row = rows.get(device.id) ?? { element: el('details', {}), last: '' };
	rows.set(device.id, row);
	const drawn = JSON.stringify(device);
	if (drawn !== row.last) {
		row.last = drawn;
		draw(row.element, device);
	}
	return row.element;
}

/**
 * @param {HTMLDetailsElement} element
 * @param {Device} device
 */
function draw(element, { id, owner, gone, notices }) {
	const newest = notices.at(-1);
	const summary = el(
		'summary',
		{},
		el('span', { class: 'who' }, owner),
		el('span', { class: 'when' }, newest ? timeOf(newest.at) : ''),
		el(
			'span',
			{ class: 'glance folds' },
			gone ? 'Takes no notices any more' : (newest?.payload.title ?? 'No notice yet')
		)
	);
	const list = el('ol', { class: 'said' }, ...notices.map(noticeItem));
	element.replaceChildren(summary, el('div', { class: 'inside' }, list, ...(gone ? [] : [takeAway(id)])));
}

/** @param {Notice} notice */
function noticeItem({ at, payload: { title = '', body = '', url } }) {
	const by = el('p', { class: 'by' }, el('b', {}, title), ` ${timeOf(at)}`);
	const open = url
		? [el('a', { href: url, target: '_blank', rel: 'noopener noreferrer' }, 'Tap to open')]
		: [];
	return el('li', {}, by, el('p', { class: 'words' }, body), el('p', { class: 'by' }, ...open));
}

/** What a person does in the settings of their browser. @param {string} id */
function takeAway(id) {
	const button = el('button', { type: 'button' }, 'Take the permission away');
	button.addEventListener('click', () => {
		button.disabled = true;
		void fetch(`/push/devices/${id}`, { method: 'DELETE' });
	});
	return el('div', { class: 'line' }, button);
}
