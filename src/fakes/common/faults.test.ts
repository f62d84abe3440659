import { describe, expect, it } from 'vitest';
import { takeFault, type Fault } from './faults';

type Mode = 'ok' | '500';

describe('takeFault', () => {
	it.each([
		['without a count until it is changed', null, ['500', '500', '500']],
		['once', 1, ['500', 'ok', 'ok']],
		['twice', 2, ['500', '500', 'ok']]
	])('lasts %s', (_how, left, modes) => {
		const fault: Fault<Mode> = { mode: '500', left };
		expect([takeFault(fault), takeFault(fault), takeFault(fault)]).toEqual(modes);
	});
});
