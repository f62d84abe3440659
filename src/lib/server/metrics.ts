import { count, eq } from 'drizzle-orm';
import { collectDefaultMetrics, Counter, Gauge, Registry } from 'prom-client';
import { MESSAGE_STATES } from '$lib/domain/messages/codes';
import { db } from './db';
import { escalations, outbox } from './db/schema';
import { droppedListeners } from './live/hub';
import { cutReaders } from './live/pipe';
import { openStreams } from './live/stream';

/** Figures about the process and the work that waits. They are counts alone: no name, unit or address. */
let registry: Registry | null = null;

/** The figures in the text form of Prometheus, read at the moment of asking. */
export async function metricsText(): Promise<{ type: string; text: string }> {
	registry ??= newRegistry();
	return { type: registry.contentType, text: await registry.metrics() };
}

function newRegistry(): Registry {
	const made = new Registry();
	collectDefaultMetrics({ register: made });
	new Gauge({
		name: 'ropewalk_outbox_messages',
		help: 'Messages in the outbox by state.',
		labelNames: ['state'],
		registers: [made],
		async collect() {
			const rows = await db().select({ state: outbox.state, n: count() }).from(outbox).groupBy(outbox.state);
			for (const state of MESSAGE_STATES) {
				this.set({ state }, rows.find((row) => row.state === state)?.n ?? 0);
			}
		}
	});
	new Gauge({
		name: 'ropewalk_live_streams',
		help: 'Open live streams of this process.',
		registers: [made],
		collect() {
			this.set(openStreams());
		}
	});
	counted(made, 'ropewalk_live_readers_cut_total', 'Live readers cut because they did not read.', cutReaders);
	counted(
		made,
		'ropewalk_live_listeners_dropped_total',
		'Live listeners dropped because they threw.',
		droppedListeners
	);
	new Gauge({
		name: 'ropewalk_escalations_untaken',
		help: 'Escalations that nobody has taken yet.',
		registers: [made],
		async collect() {
			this.set(await db().$count(escalations, eq(escalations.state, 'raised')));
		}
	});
	return made;
}

/** A counter that is kept elsewhere and read at the moment of asking. */
function counted(registry: Registry, name: string, help: string, read: () => number): void {
	new Counter({
		name,
		help,
		registers: [registry],
		collect() {
			this.reset();
			this.inc(read());
		}
	});
}
