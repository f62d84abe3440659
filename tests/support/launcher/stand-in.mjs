import { createServer } from 'node:http';

/** Stands where the built application would, so that launching can be tested without one. */
if (process.env.STAND_IN_FAILS) {
	process.exit(3);
}
createServer((request, response) => {
	response.end(request.url === '/readyz' ? 'ready' : String(process.pid));
}).listen(Number(process.env.PORT), '127.0.0.1');
process.once('SIGTERM', () => process.exit(0));
