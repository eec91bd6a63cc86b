import { connect } from 'node:net';
import { once } from 'node:events';
import type { PartGrants } from '@masswright/contracts';

type Grant = PartGrants['grants'][number];

/** How a connection ends before its answer was heard. */
export type Cut =
  /** After so many bytes of the body. */
  | { after: number; how: 'closed' | 'reset' }
  /** All of it was sent, and the answer began to arrive. */
  | 'at the answer';

/** Sends a part's body over a connection that ends as told; the sender learns nothing of what became of it. */
export async function sendCut({ url, headers }: Grant, body: Uint8Array, cut: Cut): Promise<void> {
  const { hostname, port, pathname, search, host } = new URL(url);
  const socket = connect(Number(port || 80), hostname);
  socket.on('error', () => undefined);
  const gone = new Promise<void>((resolve) => socket.once('close', () => resolve()));
  await once(socket, 'connect');
  const lines = Object.entries({ Host: host, Connection: 'close', ...headers, 'Content-Length': String(body.length) }).map(([name, value]) => `${name}: ${value}`);
  socket.write(`PUT ${pathname}${search} HTTP/1.1\r\n${lines.join('\r\n')}\r\n\r\n`);
  const part = cut === 'at the answer' ? body : body.subarray(0, cut.after);
  const answered = once(socket, 'data').catch(() => undefined);
  await Promise.race([new Promise<void>((resolve) => socket.write(part, () => resolve())), gone]);
  if (cut === 'at the answer') await Promise.race([answered, gone]);
  if (cut !== 'at the answer' && cut.how === 'closed') socket.destroy();
  else socket.resetAndDestroy();
  await gone;
}
