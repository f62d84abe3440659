import { count, eq } from 'drizzle-orm';
import { collectDefaultMetrics, Gauge, Registry } from 'prom-client';
import { db } from './db';
import { escalations, outbox } from './db/schema';
import { MESSAGE_STATES } from './db/schema/messages';
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
