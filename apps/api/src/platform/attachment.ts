import type { ServerResponse } from 'node:http';
import type { Response } from 'express';

/** Letters, digits and marks of any script, and a few signs that no file system, shell or header takes for more than a name. */
const notOfAName = /[^\p{L}\p{M}\p{N} ._()-]+/gu;

/** A name for a file from what people call a thing; never empty, never hidden, at most 100 characters. */
export function makeFileName(name: string, extension: string): string {
  const clean = name.normalize('NFC').replace(notOfAName, '-').replace(/\s+/gu, ' ').replace(/^[-. ]+|[-. ]+$/gu, '');
  return `${[...clean].slice(0, 100).join('').trim() || 'masswright'}.${extension}`;
}

/** What is said of an answer that is a file: to be saved under a name, never shown, never guessed at, never kept. */
export function describeAttachment(response: Response, { fileName, mediaType }: { fileName: string; mediaType: string }): void {
  response.attachment(fileName);
  response.set({ 'Content-Type': `${mediaType}; charset=utf-8`, 'X-Content-Type-Options': 'nosniff', 'Cache-Control': 'no-store' });
}

/**
 * Sends pieces as they are made, no faster than they are read. The first piece is made before anything is sent, so that a refusal is still a refusal; should
 * a later one fail, the connection is cut: a file that ends without its end can't be taken for whole.
 */
export async function sendPieces(response: ServerResponse, pieces: AsyncIterator<string>, describe: () => void): Promise<void> {
  let piece = await pieces.next();
  describe();
  const closed = new Promise<void>((resolve) => response.once('close', resolve));
  response.on('error', () => response.destroy());
  try {
    // Whoever stops reading has no more pieces made for them.
    while (piece.done !== true && !response.destroyed) {
      if (!response.write(piece.value)) await Promise.race([new Promise<void>((resolve) => response.once('drain', resolve)), closed]);
      piece = await pieces.next();
    }
    response.end();
  } catch (error) {
    response.destroy();
    throw error;
  } finally {
    await pieces.return?.();
  }
}
