import { byId, el, timeOf } from './elements.js';
import { showMails } from './mailbox.js';
import { showNotices } from './notices.js';
import { openFromAddress, showPhones } from './phones.js';
import { drawMark } from './rope.js';

const POLL_MS = 1000;

/** What each behaviour of the fakes means to a person. */
const SMS_WORDS = {
	ok: 'works',
	refuse: 'closes every connection',
	500: 'answers 500',
	429: 'answers 429, too many',
	slow: 'answers too late',
	'accept-then-drop': 'accepts, then is cut off',
	undelivered: 'does not reach the phones',
	'duplicate-callbacks': 'reports everything twice'
};
const MAIL_WORDS = {
	ok: 'works',
	greylist: 'says try later (451)',
	reject: 'refuses (550)',
	drop: 'cuts off in the middle'
};

const PUSH_WORDS = {
	ok: 'works',
	410: 'has lost every device (410)',
	404: 'knows no device (404)',
	429: 'answers 429, too many',
	500: 'answers 500',
	hang: 'never answers',
	refuse: 'closes every connection',
	'accept-then-drop': 'shows it, then is cut off'
};

/** @type {Map<string, string>} */
const tags = new Map();

drawMark(byId('mark'));
const faults = [
	faultChoice('sms-fault', '/faults', SMS_WORDS),
	faultChoice('push-fault', '/push/faults', PUSH_WORDS),
	faultChoice('mail-fault', '/mailbox/faults', MAIL_WORDS)
];
await poll();
openFromAddress();
addEventListener('hashchange', openFromAddress);

/** Reads both sides again and again; one that has nothing new answers in a few bytes. */
async function poll() {
	try {
		await Promise.all([
			read('/phones', showPhones),
			read('/push/devices', showNotices),
			read('/mailbox/mails', showMails),
			...faults.map((refresh) => refresh())
		]);
		tellState(true);
	} catch {
		tellState(false);
	}
	setTimeout(poll, POLL_MS);
}

/**
 * Reads one side and shows it, unless it says that nothing has changed.
 * @template Item
 * @param {string} path
 * @param {(items: Item[]) => void} show
 */
async function read(path, show) {
	const tag = tags.get(path);
	const response = await fetch(path, { headers: tag ? { 'If-None-Match': tag } : {} });
	if (response.status === 304) {
		return;
	}
	if (!response.ok) {
		throw new Error(`${path} answered ${response.status}.`);
	}
	/** @type {{ items: Item[] }} */
	const { items } = await response.json();
	show(items);
	tags.set(path, response.headers.get('ETag') ?? '');
}

/** @param {boolean} isLive */
function tellState(isLive) {
	const state = byId('link-state');
	if (isLive === state.classList.contains('lost')) {
		state.classList.toggle('lost', !isLive);
		state.textContent = isLive ? 'live' : `not reached since ${timeOf(new Date().toISOString())}`;
	}
}

/**
 * Fills a choice of behaviours and answers a function that shows the one that is set.
 * @param {string} id
 * @param {string} path
 * @param {Record<string, string>} words
 */
function faultChoice(id, path, words) {
	const select = /** @type {HTMLSelectElement} */ (byId(id));
	select.append(...Object.entries(words).map(([mode, word]) => el('option', { value: mode }, word)));
	select.value = 'ok';
	select.addEventListener('change', () => {
		const headers = { 'Content-Type': 'application/json' };
		void fetch(path, { method: 'PUT', headers, body: JSON.stringify({ mode: select.value }) });
		select.classList.toggle('faulty', select.value !== 'ok');
	});
	return async () => {
		const { mode } = await (await fetch(path)).json();
		if (document.activeElement !== select) {
			select.value = mode;
			select.classList.toggle('faulty', mode !== 'ok');
		}
	};
}
