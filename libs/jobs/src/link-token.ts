import { createHash, createHmac } from 'node:crypto';

export type LinkKind = 'invitation' | 'password-reset';

/**
 * The token in a mailed link: 128 bits derived from the row's id under the installation's LINK_SECRET. Being derived, it is never stored:
 * the api keeps its hash, the worker computes it again when it writes the mail, and a mail sent twice carries the same link.
 */
export function deriveLinkToken(linkSecret: string, kind: LinkKind, id: string): string {
  return createHmac('sha256', Buffer.from(linkSecret, 'hex')).update(`${kind}:${id}`).digest().subarray(0, 16).toString('base64url');
}

/** What of a token is kept and looked up. */
export function hashToken(token: string): Buffer {
  return createHash('sha256').update(token).digest();
}
