/**
 * What the service worker's own world offers, as far as it is used here. The compiler's types of it cannot stand beside
 * those of pages in one program.
 */
export interface WorkerScope {
	readonly location: { readonly origin: string };
	readonly registration: {
		showNotification(title: string, options: NotificationOptions & { renotify?: boolean }): Promise<void>;
	};
	readonly clients: {
		claim(): Promise<void>;
		matchAll(options: { type: 'window'; includeUncontrolled: boolean }): Promise<readonly WorkerTab[]>;
		openWindow(url: string): Promise<WorkerTab | null>;
	};
	skipWaiting(): Promise<void>;
	addEventListener<Kind extends keyof WorkerEvents>(
		kind: Kind,
		listener: (event: WorkerEvents[Kind]) => void
	): void;
}

export interface WorkerTab {
	readonly url: string;
	focus(): Promise<WorkerTab>;
}

interface Lasting {
	waitUntil(work: Promise<unknown>): void;
}

interface WorkerEvents {
	install: Lasting;
	activate: Lasting;
	push: Lasting & { readonly data: { text(): string } | null };
	notificationclick: Lasting & { readonly notification: { readonly data: unknown; close(): void } };
}
