import { once } from 'node:events';
import { createServer, get, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { describe, expect, it } from 'vitest';
import { makeFileName, sendPieces } from './attachment';

/** A server that answers once, in some way; gives what the client gets. */
async function serve(answer: (response: ServerResponse) => Promise<void>): Promise<{ message: IncomingMessage; answered: Promise<unknown>; close: () => void }> {
  let answered: Promise<unknown> = Promise.resolve();
  const server = createServer((_, response) => {
    answered = answer(response).then(() => 'sent', (error: unknown) => error);
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  const request = get({ port: (server.address() as AddressInfo).port, host: '127.0.0.1' });
  const [message] = (await once(request, 'response')) as [IncomingMessage];
  return { message, answered, close: () => server.close() };
}
const megabyte = 'x'.repeat(1 << 20);

/** Pieces made one after the other, each when it is asked for. */
async function* makePieces(make: (n: number) => string | undefined): AsyncGenerator<string> {
  for (let n = 0; ; n++) {
    const piece = await Promise.resolve(make(n));
    if (piece === undefined) return;
    yield piece;
  }
}

describe('the name of a file that is made', () => {
  it.each([
    ['Reel, mark 2', 'Reel- mark 2.csv'],
    ['../../etc/passwd', 'etc-passwd.csv'],
    ['a/b\\c:d', 'a-b-c-d.csv'],
    ['käse été 部品', 'käse été 部品.csv'],
    ['gnp.\u202Eslx', 'gnp.-slx.csv'],
    ['tab\tand\nline', 'tab-and-line.csv'],
    ['...', 'masswright.csv'],
    ['', 'masswright.csv'],
    ['="x"', 'x.csv'],
  ])('%j is %j', (name, expected) => {
    expect(makeFileName(name, 'csv')).toBe(expected);
  });

  it('has at most a hundred characters and its extension', () => {
    expect(makeFileName('x'.repeat(300), 'json')).toBe(`${'x'.repeat(100)}.json`);
  });
});

describe('a file that is sent piece by piece', () => {
  it('arrives whole and in order', async () => {
    const { message, close } = await serve((response) => sendPieces(response, makePieces((n) => (n < 50 ? `${n},` : undefined)), () => response.setHeader('X-Said', 'yes')));
    let text = '';
    for await (const chunk of message) text += String(chunk);
    expect(text).toBe(Array.from({ length: 50 }, (_, n) => `${n},`).join(''));
    expect(message.headers['x-said']).toBe('yes');
    close();
  });

  it('is cut off where a later piece fails: it can’t be taken for whole', async () => {
    const fail = (n: number): string => {
      if (n > 0) throw new Error('deliberate');
      return megabyte;
    };
    const { message, answered, close } = await serve((response) => sendPieces(response, makePieces(fail), () => undefined));
    await expect((async () => { for await (const _ of message); })()).rejects.toThrow(/aborted/);
    expect(await answered).toMatchObject({ message: 'deliberate' });
    close();
  });

  it('is made no faster than it is read, and not at all once nobody reads', async () => {
    let made = 0;
    let isOver = false;
    const pieces = makePieces(() => (made++ < 500 ? megabyte : undefined));
    const watched = { next: () => pieces.next(), return: () => ((isOver = true), pieces.return(undefined)) };
    const { message, answered, close } = await serve((response) => sendPieces(response, watched, () => undefined));
    // Nothing is read: what the sockets hold is made, some megabytes, and no more.
    await new Promise((resolve) => setTimeout(resolve, 300));
    expect(made).toBeLessThan(100);
    message.destroy();
    expect(await answered).toBe('sent');
    expect(isOver).toBe(true);
    expect(made).toBeLessThan(100);
    close();
  });
});
