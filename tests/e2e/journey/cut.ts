import { expect } from '@playwright/test';
import { signInAs } from '../../support/api';
import { expectConnected } from '../people';
import type { Day } from './day';

/** The server is killed and comes back: what was written meanwhile is on every page, without a gap. */
export async function cutAndResume(day: Day): Promise<void> {
	for (const each of ['surgeon', 'therapist'] as const) {
		await day.openThread(day.page(each));
		await expectConnected(day.page(each));
	}
	await day.product.kill();
	await expect(
		day
			.page('surgeon')
			.getByText(/Not connected/)
			.first()
	).toBeVisible();
	await day.product.restart();
	const nurseApi = await signInAs(day.product.url, 'nurse');
	const threadId = day.thread.split('/').at(-1) ?? '';
	for (const n of [1, 2, 3]) {
		await nurseApi.post(`/api/threads/${threadId}/entries`, { body: `After the restart ${n}` });
	}
	for (const each of ['surgeon', 'therapist'] as const) {
		for (const n of [1, 2, 3]) {
			await expect(day.page(each).getByText(`After the restart ${n}`)).toBeVisible({ timeout: 20_000 });
		}
		await expectConnected(day.page(each));
	}
}
