import { createServer } from 'node:net';

/**
 * Whether this port of the loopback address can be had.
 * @param {number} port
 * @returns {Promise<boolean>}
 */
export async function isFree(port) {
  return (await tryPort(port)) !== null;
}

/** A port that nobody has now. @returns {Promise<number>} */
export async function freePort() {
  const port = await tryPort(0);
  if (port === null) throw new Error('This machine has no free port.');
  return port;
}

/**
 * @param {number} port
 * @returns {Promise<number | null>}
 */
function tryPort(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(null));
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      const address = server.address();
      server.close(() => resolve(typeof address === 'object' && address ? address.port : null));
    });
  });
}
