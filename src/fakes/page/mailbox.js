import { arrange, byId, el, timeOf, withLinks } from './elements.js';

/**
 * @typedef {{ filename: string | null, contentType: string, size: number }} Attachment
 * @typedef {{ id: string, at: string, from: string, to: string, subject: string, text: string,
 *   attachments: Attachment[] }} Mail
 */

/** @type {Map<string, HTMLDetailsElement>} */
const rows = new Map();

/**
 * Shows the mails, the newest first. A mail never changes, so a row is made once.
 * @param {Mail[]} mails
 */
export function showMails(mails) {
	byId('mails-empty').hidden = mails.length > 0;
	for (const mail of mails) {
		const key = keyOf(mail);
		rows.set(key, rows.get(key) ?? rowOf(mail));
	}
	const shown = new Set(mails.map(keyOf));
	for (const [key, row] of rows) {
		if (!shown.has(key)) {
			row.remove();
			rows.delete(key);
		}
	}
	arrange(byId('mail-list'), [...rows.values()].reverse());
}

/** Ids begin again when the mail fake is started again. @param {Mail} mail */
function keyOf({ id, at }) {
	return `${id} ${at}`;
}

/** @param {Mail} mail */
function rowOf({ id, at, from, to, subject, text, attachments }) {
	const summary = el(
		'summary',
		{},
		el('span', { class: 'who' }, subject || 'Without a subject'),
		el('span', { class: 'when' }, timeOf(at)),
		el('span', { class: 'glance' }, `to ${to}`)
	);
	const files = attachments.map((file, index) => fileLink(id, file, index));
	const inside = el(
		'div',
		{ class: 'inside' },
		el('p', { class: 'by' }, `from ${from}`),
		el('p', { class: 'words' }, ...withLinks(text.trimEnd()))
	);
	inside.append(...files);
	return el('details', {}, summary, inside);
}

/**
 * @param {string} id
 * @param {Attachment} file
 * @param {number} index
 */
function fileLink(id, { filename, contentType, size }, index) {
	const link = el('a', { href: `/mailbox/mails/${id}/attachments/${index}` }, filename ?? 'attachment');
	return el('p', { class: 'files' }, link, ` ${contentType}, ${size} bytes`);
}
