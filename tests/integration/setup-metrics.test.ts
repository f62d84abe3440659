import { expect, it } from 'vitest';
import { metricsText } from '$lib/server/metrics';
import { addAlert, addEscalation } from '../support/messages';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital({});

it('counts what waits, as it is at the moment of asking', async () => {
	const before = (await metricsText()).text;
	expect(before).toContain('ropewalk_escalations_untaken 0\n');
	expect(before).toContain('ropewalk_outbox_messages{state="ready"} 0\n');
	await addAlert(await addEscalation(hospital), hospital.people.nurse.id);
	const { type, text } = await metricsText();
	expect(type).toContain('text/plain');
	expect(text).toContain('ropewalk_escalations_untaken 1\n');
	expect(text).toContain('ropewalk_outbox_messages{state="ready"} 1\n');
	expect(text).toContain('ropewalk_live_streams 0\n');
	expect(text).toContain('process_cpu_seconds_total');
});

it('tells nothing of people, patients and places', async () => {
	const { text } = await metricsText();
	const { people, patient, units } = hospital;
	for (const personal of [people.nurse.name, people.nurse.id, patient.name, patient.phone, units.ward]) {
		expect(text).not.toContain(personal);
	}
	expect(text).not.toMatch(/saltmarsh|Tern Ward|127\.0\.0\.1/);
});
