/**
 * Kill the server with SIGKILL at random moments while four writers post, start it again, and look: nothing that
 * was answered is lost or doubled, a retry with the same key converges, and it is ready again within three seconds,
 * of twenty starts all but one. Then the same in the middle of calls for help: none lost, none with two holders, and
 * every untaken one goes on. Before both it is killed again and again while it sends messages: each arrives, and twice
 * only where nobody could know. Faults F1 and F3.
 * `npm run test:crash` runs many rounds, `--short` a few. The seed is printed; `--seed N` repeats a run, and
 * `--only messages` does the messages alone.
 */
import { setTimeout as pause } from 'node:timers/promises';
import { admit, signInAs, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { checkEntries, checkFile } from './checks';
import { checkCalls } from './escalation-checks';
import { callThroughKill, type Call, type Crew, type Taker } from './escalations';
import { sendThroughKills } from './messages';
import { postUntil, send, type Write } from './writers';

const READY_MS = 3_000;
/** A machine that others work on too starts a program late now and then: of so many starts one may be slower. */
const ONE_SLOW_IN = 20;
const SHORT_ROUNDS = 5;
const LONG_ROUNDS = 60;
const SHORT_CALLS = 4;
const LONG_CALLS = 100;
const SHORT_MESSAGES = 100;
const LONG_MESSAGES = 2_000;
const WRITERS = ['surgeon', 'nurse', 'therapist', 'physician'] as const;

const argument = (name: string) => {
	const index = process.argv.indexOf(name);
	return index < 0 ? null : (process.argv[index + 1] ?? null);
};
const rounds = process.argv.includes('--short') ? SHORT_ROUNDS : LONG_ROUNDS;
const callCount = process.argv.includes('--short') ? SHORT_CALLS : LONG_CALLS;
const messageCount = process.argv.includes('--short') ? SHORT_MESSAGES : LONG_MESSAGES;
const only = argument('--only');
const seed = Number(argument('--seed') ?? Date.now() % 1_000_000);
const random = mulberry32(seed);

let passed = 0;
let failed = 0;

function check(name: string, wrong: string[]): void {
	passed += wrong.length === 0 ? 1 : 0;
	failed += wrong.length === 0 ? 0 : 1;
	console.log(`${wrong.length === 0 ? 'ok  ' : 'FAIL'} ${name}`);
	wrong.slice(0, 5).forEach((line) => console.log(`     ${line}`));
}

/** A small seeded generator, so that a failing run can be repeated. */
function mulberry32(start: number): () => number {
	let state = start;
	return () => {
		state = (state + 0x6d2b79f5) | 0;
		let t = Math.imul(state ^ (state >>> 15), 1 | state);
		t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
		return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
	};
}

async function makeThread(client: Client): Promise<string> {
	const episodeId = await admit(client);
	const { body } = await client.post(`/api/episodes/${episodeId}/referrals`, {
		service: 'physiotherapy',
		priority: 'soon',
		question: 'Crash?'
	});
	return String(body.threadId);
}

/** One kill: writers post, the server dies, it starts again, and what had no answer is sent again with its key. */
async function crash(
	product: Product,
	clients: Client[],
	threads: string[],
	writes: Write[],
	n: number
): Promise<number> {
	let stop = false;
	const mine: Write[][] = clients.map(() => []);
	const writing = clients.map((client, index) => {
		const threadId = threads[index % threads.length] ?? '';
		return postUntil(client, threadId, `writer ${index} of round ${n}`, () => stop, mine[index] ?? []);
	});
	await pause(100 + random() * 300);
	await product.kill('SIGKILL');
	stop = true;
	await Promise.all(writing);
	const started = performance.now();
	await product.restart();
	const ready = performance.now() - started;
	for (const [index, client] of clients.entries()) {
		// An answered one is sent again too: it must get its first answer.
		const again = mine[index]?.slice(-2) ?? [];
		for (const write of again) {
			await send(client, write);
		}
		writes.push(...(mine[index] ?? []));
	}
	return ready;
}

/** How long the starts took: the middle one and the slowest are said, too many slow ones are a fault. */
function checkReady(readyTimes: readonly number[]): void {
	const sorted = readyTimes.toSorted((a, b) => a - b).map(Math.round);
	const slow = sorted.filter((ms) => ms > READY_MS);
	const figures = `${sorted.length} starts, ${sorted[sorted.length >> 1]} ms in the middle, ${sorted.at(-1)} ms at most`;
	const faults = slow.length * ONE_SLOW_IN > sorted.length ? slow.map((ms) => `ready after ${ms} ms`) : [];
	check(`ready again within ${READY_MS} ms: ${figures}, ${slow.length} slower`, faults);
}

async function takerOf(client: Client): Promise<Taker> {
	const { user } = (await client.get('/api/me')).body as unknown as { user: { id: string } };
	return { client, id: user.id };
}

/** Kill the server once in the middle of each of many calls for help, and add how long each start took. */
async function killCalls(
	product: Product,
	[surgeon, nurse, therapist, physician]: Client[],
	readyTimes: number[]
): Promise<void> {
	if (!surgeon || !nurse || !therapist || !physician) {
		throw new Error('The crew of a call is not complete.');
	}
	const crew: Crew = { surgeon, therapist, takers: [await takerOf(nurse), await takerOf(physician)] };
	const calls: Call[] = [];
	for (let n = 0; n < callCount; n += 1) {
		const { call, readyMs } = await callThroughKill(product, crew, random);
		calls.push(call);
		readyTimes.push(readyMs);
		if (calls.length % 10 === 0) {
			console.log(`     ${calls.length} of ${callCount} calls`);
		}
	}
	check(
		'calls for help, a kill in each: none lost, none with two holders, all go on',
		await checkCalls(product, surgeon, calls)
	);
}

/** Kill the server again and again until many messages have left. */
async function killSendings(product: Product): Promise<void> {
	const admin = await signInAs(product.url, 'admin');
	const { wrong, kills, twice } = await sendThroughKills(product, admin, messageCount, random);
	check(`${messageCount} messages in ${kills} kills: none lost, ${twice} twice, of unknown end alone`, wrong);
	await product.restart();
}

async function main(): Promise<void> {
	console.log(`crash test: ${rounds} rounds, ${callCount} calls and ${messageCount} messages, seed ${seed}`);
	const product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	try {
		await killSendings(product);
		if (only === 'messages') {
			return;
		}
		const clients = await Promise.all(WRITERS.map((role) => signInAs(product.url, role)));
		const threads = [await makeThread(clients[0] as Client), await makeThread(clients[0] as Client)];
		const writes: Write[] = [];
		const readyTimes: number[] = [];
		for (let n = 0; n < rounds; n += 1) {
			readyTimes.push(await crash(product, clients, threads, writes, n));
		}
		check(
			`${writes.length} entries in ${rounds} kills: none lost, none doubled`,
			await checkEntries(clients[1] as Client, writes)
		);
		await killCalls(product, clients, readyTimes);
		checkReady(readyTimes);
		await product.kill('SIGTERM');
		check('file, foreign keys and audit chain are whole', await checkFile(product.dataDir));
	} finally {
		await product.stop();
	}
	console.log(`${passed} passed, ${failed} failed`);
	process.exitCode = failed === 0 ? 0 : 1;
}

await main();
