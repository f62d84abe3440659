import { listenForNotices } from '$lib/client/service-worker/push';
import type { WorkerScope } from '$lib/client/service-worker/scope';

/** What runs for this origin without any page. A page registers it when somebody turns their notices on. */
const worker = globalThis as unknown as WorkerScope;

// A new version counts at once: it keeps nothing that an open page could rely on.
worker.addEventListener('install', () => void worker.skipWaiting());
worker.addEventListener('activate', (event) => event.waitUntil(worker.clients.claim()));
listenForNotices(worker);
