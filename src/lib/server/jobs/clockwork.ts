import { now } from '../clock';
import { onCommit } from '../effects';
import { log } from '../log';

/**
 * Everything that happens by itself: chain steps, messages, lapses, cleaning. What is due stands in the database,
 * so a restart forgets nothing; this loop only asks each job, once a second and after every commit, to do what is
 * due at `now`. A job answers how many things it did.
 */
export interface Job {
	name: string;
	run(now: number): Promise<number>;
}

const BEAT_MS = 1_000;
/** A round that never ends would hang the demonstration's clock; no honest backlog is this long. */
const MAX_ROUNDS = 10_000;

export class Clockwork {
	#timer: NodeJS.Timeout | null = null;
	#round: Promise<number> = Promise.resolve(0);
	#again = false;
	#running = false;
	#stopped = true;
	#unregister = () => {};

	constructor(private readonly jobs: Job[]) {}

	start(): void {
		this.#stopped = false;
		this.#unregister = onCommit(() => this.wake());
		this.wake();
	}

	/** Ask for a round soon; a round in progress is followed by one more. */
	wake(): void {
		if (this.#stopped) {
			return;
		}
		if (this.#running) {
			this.#again = true;
			return;
		}
		void this.#turn();
	}

	/** Do all due work until nothing is left, and resolve then. */
	async settle(): Promise<void> {
		for (let n = 0; n < MAX_ROUNDS; n += 1) {
			await this.#round;
			if ((await this.#run()) === 0) {
				return;
			}
		}
		throw new Error('Due work does not come to an end: some job finds the same thing due again and again.');
	}

	/** Stop and wait for the round in progress. */
	async stop(): Promise<void> {
		this.#stopped = true;
		this.#unregister();
		if (this.#timer) {
			clearTimeout(this.#timer);
		}
		await this.#round;
	}

	async #turn(): Promise<void> {
		this.#running = true;
		if (this.#timer) {
			clearTimeout(this.#timer);
		}
		do {
			this.#again = false;
			await this.#run();
		} while (this.#again && !this.#stopped);
		this.#running = false;
		if (!this.#stopped) {
			this.#timer = setTimeout(() => this.wake(), BEAT_MS);
			this.#timer.unref();
		}
	}

	/** One round of all jobs; rounds never overlap. */
	#run(): Promise<number> {
		this.#round = this.#round.then(async () => {
			let done = 0;
			for (const job of this.jobs) {
				done += await runSafely(job);
			}
			return done;
		});
		return this.#round;
	}
}

/** A job that fails is logged and tried again at the next beat; the others go on. */
async function runSafely(job: Job): Promise<number> {
	try {
		return await job.run(now());
	} catch (error) {
		log().error({ job: job.name, err: error }, 'job failed');
		return 0;
	}
}
