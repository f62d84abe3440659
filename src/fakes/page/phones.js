import { arrange, byId, el, timeOf, withLinks } from './elements.js';

/**
 * @typedef {{ sid: string, at: string, direction: 'in' | 'out', body: string, status: string }} Message
 * @typedef {{ sid: string, at: string, status: string, said: string[], pressed: string, waitsForDigit: boolean }} Call
 * @typedef {{ number: string, owner: string | null, messages: Message[], calls: Call[] }} Phone
 *
 * @typedef {object} Row
 * @property {HTMLDetailsElement} element
 * @property {HTMLElement} who
 * @property {HTMLElement} when
 * @property {HTMLElement} glance
 * @property {HTMLOListElement} said
 * @property {HTMLLabelElement} label of the reply's field
 * @property {number} seen how many messages and calls were there when it was last open
 * @property {string} last what was drawn last
 */

const KEYS = ['1', '2', '3', '4', '5', '6', '7', '8', '9', '0'];

/** @type {Map<string, Row>} */
const rows = new Map();

/** What was read last, null before the first time. @type {Phone[] | null} */
let known = null;

/**
 * Shows the phones, the one with the newest message first. A row stays the same element, so that what somebody has
 * typed into it stays too.
 * @param {Phone[]} phones
 */
export function showPhones(phones) {
	byId('phones-empty').hidden = phones.length > 0;
	const isFirst = known === null;
	known = phones;
	const sorted = [...phones].sort((a, b) => newestOf(b).localeCompare(newestOf(a)));
	const elements = sorted.map((phone) => updateRow(phone, isFirst).element);
	arrange(byId('phone-list'), elements);
}

/** Opens the phone that the address names behind its `#`, as in `#+353860000001`. */
export function openFromAddress() {
	const row = rows.get(decodeURIComponent(location.hash.slice(1)));
	if (row) {
		row.element.open = true;
		row.element.scrollIntoView();
	}
}

/** @param {Phone} phone */
function newestOf({ messages, calls }) {
	return [messages.at(-1)?.at ?? '', calls.at(-1)?.at ?? ''].sort()[1] ?? '';
}

/** @param {Phone} phone */
function glanceOf({ messages, calls }) {
	const message = messages.at(-1);
	const call = calls.at(-1);
	if (call && (!message || call.at > message.at)) {
		return call.said.at(-1) ?? 'A call';
	}
	return message?.body ?? 'No message yet';
}

/**
 * @param {Phone} phone
 * @param {boolean} isFirst whether the page has just been opened, when nothing counts as new
 * @returns {Row}
 */
function updateRow(phone, isFirst) {
	const row = rows.get(phone.number) ?? addRow(phone);
	const count = phone.messages.length + phone.calls.length;
	if (row.element.open || isFirst) {
		row.seen = count;
	}
	const drawn = JSON.stringify([phone, row.seen]);
	if (drawn !== row.last) {
		row.last = drawn;
		draw(row, phone, count - row.seen);
	}
	return row;
}

/**
 * @param {Row} row
 * @param {Phone} phone
 * @param {number} fresh
 */
function draw(row, phone, fresh) {
	const { owner, number, messages, calls } = phone;
	row.who.replaceChildren(...(owner ? [owner, el('small', {}, number)] : [number]));
	const at = newestOf(phone);
	row.when.replaceChildren(...(fresh > 0 ? [el('b', {}, `${fresh} new`)] : []), at ? timeOf(at) : '');
	row.glance.textContent = glanceOf(phone);
	const items = [
		...messages.map((message) => ({ at: message.at, item: messageItem(message, owner ?? number) })),
		...calls.map((call) => ({ at: call.at, item: callItem(call) }))
	].sort((a, b) => a.at.localeCompare(b.at));
	row.label.textContent = `Reply as ${owner ?? number}`;
	row.said.replaceChildren(...items.map(({ item }) => item));
	if (items.length === 0) {
		row.said.append(el('li', { class: 'nothing' }, 'No message yet.'));
	}
}

/**
 * @param {Phone} phone
 * @returns {Row}
 */
function addRow({ number }) {
	const who = el('span', { class: 'who' });
	const when = el('span', { class: 'when' });
	const glance = el('span', { class: 'glance folds' });
	const said = el('ol', { class: 'said' });
	const { form, label } = replyForm(number);
	const element = el(
		'details',
		{},
		el('summary', {}, who, when, glance),
		el('div', { class: 'inside' }, said, form)
	);
	// What is open is no longer new.
	element.addEventListener('toggle', () => showPhones(known ?? []));
	const row = { element, who, when, glance, said, label, seen: 0, last: '' };
	rows.set(number, row);
	return row;
}

/**
 * @param {Message} message
 * @param {string} owner
 */
function messageItem({ at, direction, body, status }, owner) {
	const isReply = direction === 'in';
	const by = el('p', { class: 'by' }, el('b', {}, isReply ? owner : 'Ropewalk'), ` ${timeOf(at)}, ${status}`);
	return el('li', isReply ? { class: 'reply' } : {}, by, el('p', { class: 'words' }, ...withLinks(body)));
}

/** @param {Call} call */
function callItem({ sid, at, status, said, pressed, waitsForDigit }) {
	const by = el(
		'p',
		{ class: 'by' },
		el('b', {}, 'Call from Ropewalk'),
		` ${timeOf(at)}, ${status.replace('-', ' ')}`
	);
	const words = el('p', { class: 'words' }, said.join('\n'));
	const keys = el('p', { class: 'by' }, pressed ? `pressed ${pressed}` : '');
	return el('li', {}, by, words, keys, ...(waitsForDigit ? [keypad(sid)] : []));
}

/** @param {string} sid */
function keypad(sid) {
	const pad = el('div', { class: 'keys', role: 'group', 'aria-label': 'Press a digit' });
	for (const digits of KEYS) {
		const key = el('button', { type: 'button' }, digits);
		key.addEventListener('click', () => {
			pad.querySelectorAll('button').forEach((button) => (button.disabled = true));
			void post(`/calls/${sid}/digits`, { digits });
		});
		pad.append(key);
	}
	return pad;
}

/** @param {string} number */
function replyForm(number) {
	const id = `reply-${number.slice(1)}`;
	const input = el('input', { id, autocomplete: 'off', maxlength: '1600', required: '' });
	const button = el('button', { type: 'submit' }, 'Send');
	const outcome = el('p', { class: 'outcome', role: 'status' });
	const label = el('label', { for: id });
	const form = el('form', { class: 'answer' }, label, el('div', { class: 'line' }, input, button), outcome);
	form.addEventListener('submit', async (event) => {
		event.preventDefault();
		button.disabled = true;
		const { ok, text } = await post(`/phones/${encodeURIComponent(number)}/reply`, { body: input.value });
		outcome.textContent = text;
		button.disabled = false;
		if (ok) {
			input.value = '';
		}
	});
	return { form, label };
}

/**
 * @param {string} path
 * @param {object} body
 * @returns {Promise<{ ok: boolean, text: string }>}
 */
async function post(path, body) {
	try {
		const headers = { 'Content-Type': 'application/json' };
		const response = await fetch(path, { method: 'POST', headers, body: JSON.stringify(body) });
		const answer = await response.json();
		const ok = response.ok && answer.status < 400;
		return { ok, text: ok ? 'Ropewalk has it.' : (answer.detail ?? `Ropewalk answered ${answer.status}.`) };
	} catch {
		return { ok: false, text: 'The fakes do not answer.' };
	}
}
