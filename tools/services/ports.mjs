import net from 'node:net';

/**
 * Whether a server could listen there now.
 * @param {number} port
 * @returns {Promise<boolean>}
 */
export function isPortFree(port) {
  return new Promise((resolve) => {
    const probe = net.createServer();
    probe.once('error', () => resolve(false));
    probe.listen({ port, host: '127.0.0.1', exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

const handedOut = new Set();

/**
 * A free port below the range from which the system numbers outgoing connections: while a killed server is down,
 * a client's connection can't take its port, nor connect to itself there.
 * @returns {Promise<number>}
 */
export async function findFreePort() {
  for (let tries = 0; tries < 200; tries++) {
    const port = 20_000 + Math.floor(Math.random() * 12_000);
    if (!handedOut.has(port) && (await isPortFree(port))) {
      handedOut.add(port);
      return port;
    }
  }
  throw new Error('No free port between 20000 and 32000 on 127.0.0.1.');
}
