/**
 * How quick the product is, as a table: `npm run bench`. A figure over its limit is said and ends with 1. Not a part of
 * the tests, because a machine that others work on too gives other figures.
 */
import { startProduct } from '../support/server';
import { benchAnswers } from './answers';
import { benchLanes } from './lanes';

const product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
try {
	console.log(
		`${''.padEnd(52)} ${'times'.padStart(5)} ${'half'.padStart(8)} ${'95 %'.padStart(8)}  milliseconds`
	);
	const held = [await benchLanes(product), await benchAnswers(product)];
	process.exitCode = held.every(Boolean) ? 0 : 1;
} finally {
	await product.stop();
}
