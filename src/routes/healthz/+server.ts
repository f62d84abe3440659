/** Alive: the process answers. */
export const GET = () => new Response('alive\n', { headers: { 'content-type': 'text/plain' } });
