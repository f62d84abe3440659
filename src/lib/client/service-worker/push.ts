import { readNotice } from './notice';
import type { WorkerScope, WorkerTab } from './scope';

/**
 * Notices on this device: shown when they are pushed, and opened as a page when they are tapped. Nothing is taken from
 * a notice itself, so it has no buttons, and a call that is shown stays until somebody looks at it.
 */
export function listenForNotices(worker: WorkerScope): void {
	const { origin } = worker.location;
	worker.addEventListener('push', (event) => {
		const { title, body, url, tag } = readNotice(event.data?.text() ?? null, origin);
		event.waitUntil(
			worker.registration.showNotification(title, {
				...{ body, tag, data: { url } },
				...{ icon: '/favicon.svg', requireInteraction: true, renotify: tag !== '' }
			})
		);
	});
	worker.addEventListener('notificationclick', (event) => {
		event.notification.close();
		const { url } = readNotice(JSON.stringify(event.notification.data), origin);
		event.waitUntil(open(worker, url));
	});
}

/** In the tab where the page stands already, else in a new one: what is half typed in another tab is left alone. */
async function open({ clients }: WorkerScope, url: string): Promise<WorkerTab | null> {
	const tabs = await clients.matchAll({ type: 'window', includeUncontrolled: true });
	const there = tabs.find((tab) => tab.url === url);
	return there ? there.focus() : clients.openWindow(url);
}
