import { expect, test, type Page, type Worker } from '@playwright/test';
import { signInAs } from '../support/api';
import { pushedDevice, subscribe, type Subscription } from '../support/push';
import { startProduct, type Product } from '../support/server';
import { expectAccessible } from './accessible';
import { expectConnected, PHONE, seat, type Seat } from './people';

/**
 * Notices on a device: turned on in a real browser, shown by the real service worker, opened by a tap. No push service
 * can be reached here, so the browser is handed a subscription of the stand-in's, and what the stand-in got is delivered
 * to the worker by the browser's own tools.
 */
test.describe.configure({ mode: 'serial' });

let product: Product;
let nurse: Seat;
let phone: Subscription;

test.beforeAll(async ({ browser }) => {
	test.setTimeout(180_000);
	product = await startProduct();
	nurse = await seat(browser, product.url, 'nurse', PHONE);
	await nurse.context.grantPermissions(['notifications'], { origin: product.url });
	phone = await subscribe(product, 'Rona Ferris');
	await nurse.context.addInitScript((given: Subscription) => {
		PushManager.prototype.subscribe = () =>
			Promise.resolve({ toJSON: () => given } as unknown as PushSubscription);
	}, phone);
});
test.afterAll(async () => {
	await nurse?.context.close();
	await product?.stop();
});

const shown = (page: Page) =>
	page.evaluate(async () => {
		const registration = await navigator.serviceWorker.ready;
		const notices = await registration.getNotifications();
		return notices.map(({ title, body, data }) => ({ title, body, url: (data as { url: string }).url }));
	});

/** What the stand-in got, handed to the worker as a push service would. */
async function deliver(page: Page, data: string): Promise<void> {
	const tools = await page.context().newCDPSession(page);
	const registered = new Promise<string>((resolve) => {
		tools.on('ServiceWorker.workerRegistrationUpdated', ({ registrations }) => {
			registrations.forEach(({ registrationId }) => resolve(registrationId));
		});
	});
	await tools.send('ServiceWorker.enable');
	const registrationId = await registered;
	await tools.send('ServiceWorker.deliverPushMessage', { origin: product.url, registrationId, data });
}

/** Tap the notice. A browser opens windows for people's taps alone, so the page that it would open is answered. */
function tap(worker: Worker): Promise<string> {
	return worker.evaluate(async () => {
		const world = globalThis as unknown as {
			registration: ServiceWorkerRegistration;
			clients: { openWindow: (url: string) => Promise<null> };
			dispatchEvent(event: Event): boolean;
			NotificationEvent: new (kind: string, of: { notification: Notification | undefined }) => Event;
		};
		const [notification] = await world.registration.getNotifications();
		return new Promise<string>((resolve) => {
			Object.defineProperty(world.clients, 'openWindow', {
				value: (url: string) => Promise.resolve(resolve(url))
			});
			world.dispatchEvent(new world.NotificationEvent('notificationclick', { notification }));
		});
	});
}

test('are turned on for this device, which then says so', async () => {
	const { page } = nurse;
	await page.goto('/account');
	await expectConnected(page);
	await expect(page.getByText('on no device')).toBeVisible();
	await page.getByRole('button', { name: 'Turn notices on here' }).click();
	const row = page.getByRole('listitem').filter({ hasText: 'this device' });
	await expect(row).toContainText('nothing sent yet');
	await expectAccessible(page);
	await row.getByRole('button', { name: 'Try it' }).click();
	await expect(page.getByText('A notice is on its way.')).toBeVisible();
	await expect.poll(async () => (await pushedDevice(product, phone))?.notices.length).toBe(1);
});

test('show a call for help with nothing of the patient, and a tap opens its page and takes nothing', async () => {
	const { page } = nurse;
	const therapist = await signInAs(product.url, 'therapist');
	const { items } = (await therapist.get('/api/episodes')).body;
	const episode = items.find(({ bed }) => bed !== null) as unknown as { id: string; bed: string };
	const raised = await therapist.post(`/api/episodes/${episode.id}/escalations`, {
		grade: 'high',
		situation: 'Systolic pressure fell from 128 to 108.',
		background: 'Bypass.',
		assessment: 'Too much.',
		request: 'Please come.'
	});
	const newest = async () => (await pushedDevice(product, phone))?.notices.at(-1)?.payload;
	await expect.poll(async () => (await newest())?.title).toBe('Ropewalk HIGH');
	await deliver(page, JSON.stringify(await newest()));
	await expect.poll(() => shown(page)).toHaveLength(1);
	const [notice] = await shown(page);
	expect(notice?.title).toBe('Ropewalk HIGH');
	expect(notice?.body).toMatch(new RegExp(`^[\\w ]+, bed ${episode.bed}\\. Somebody is needed\\.`));
	const [worker] = nurse.context.serviceWorkers();
	const opened = worker ? await tap(worker) : '';
	expect(opened).toBe(notice?.url);
	await page.goto(opened);
	await expect(page.getByRole('button', { name: 'I take it' })).toBeVisible();
	const { body } = await therapist.get(`/api/escalations/${raised.body.id}`);
	expect(body).toMatchObject({ state: 'raised' });
});

test('are turned off, and end with signing out', async () => {
	const { page } = nurse;
	await page.goto('/account');
	await expectConnected(page);
	await page.getByRole('button', { name: 'Turn off' }).click();
	await expect(page.getByText('Notices are turned off there.')).toBeVisible();
	await page.getByRole('button', { name: 'Turn notices on here' }).click();
	await expect(page.getByRole('listitem').filter({ hasText: 'this device' })).toBeVisible();
	// No page hears of it that would rightly complain.
	await page.goto('about:blank');
	await page.request.post(`${product.url}/sign-out`, { headers: { origin: product.url }, maxRedirects: 0 });
	const again = await signInAs(product.url, 'nurse');
	expect((await again.get('/account')).text).toContain('on no device');
});

test('of a made-up device stand on the page of the stand-ins, without script too', async ({ browser }) => {
	const context = await browser.newContext({ baseURL: product.url, javaScriptEnabled: false });
	const page = await context.newPage();
	await page.goto('/sign-in');
	await page.getByLabel(/e-mail/i).fill('physician@saltmarsh.example');
	await page.getByLabel(/^password/i).fill('ropewalk-demo');
	await page.getByRole('button', { name: 'Sign in' }).click();
	await page.goto('/account');
	await expect(page.getByText('Turning notices on here needs script in this browser.')).toBeVisible();
	await page.getByRole('button', { name: 'Add a made-up device' }).click();
	await page.getByRole('button', { name: 'Try it' }).click();
	await context.close();
	const { page: phones, context: others } = await seat(browser, product.smsUrl, null);
	await phones.goto('/');
	await phones
		.getByText('Hilde Castellane')
		.or(phones.getByText(/physician/i))
		.first()
		.waitFor();
	await expect(phones.getByRole('region', { name: 'Notices' })).toContainText('Ropewalk');
	await others.close();
});

test('nobody’s browser complained', () => expect(nurse.complaints).toEqual([]));
