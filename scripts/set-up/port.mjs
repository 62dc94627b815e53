import { createServer } from 'node:net';

function tryPort(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(null));
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      const { port: got } = server.address();
      server.close(() => resolve(got));
    });
  });
}

/** A free port on the loopback: the preferred one when it is free, else any. */
export async function freePort(preferred) {
  const first = preferred ? await tryPort(preferred) : null;
  return first ?? (await tryPort(0));
}
