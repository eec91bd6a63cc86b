import { randomBytes } from 'node:crypto';
import { mkdirSync, readdirSync } from 'node:fs';
import { readFile, rename, writeFile } from 'node:fs/promises';
import path from 'node:path';
import PostalMime from 'postal-mime';

/**
 * @typedef {object} Message
 * @property {string} id
 * @property {string} receivedAt
 * @property {string} from the sender in the envelope
 * @property {string[]} to the recipients in the envelope
 * @property {string} subject
 * @property {string} messageId
 * @property {string} text
 * @property {string} html
 * @property {Record<string, string>} headers by name in small letters
 */

/** @param {{ id: string, receivedAt: string, from: string, to: string[], raw: string }} stored @returns {Promise<Message>} */
async function parseMessage({ id, receivedAt, from, to, raw }) {
  const mail = await PostalMime.parse(Buffer.from(raw, 'base64'));
  return {
    id,
    receivedAt,
    from,
    to,
    subject: mail.subject ?? '',
    messageId: mail.messageId ?? '',
    text: mail.text ?? '',
    html: mail.html ?? '',
    headers: Object.fromEntries(mail.headers.map((header) => [header.key, header.value])),
  };
}

/** Every mail ever accepted, one file each, in the order of arrival; nothing is merged, a repeated mail is there twice. */
export class Mailbox {
  /** @type {Map<string, Message>} */
  #parsed = new Map();

  /** @param {string} folder */
  constructor(folder) {
    this.folder = folder;
    mkdirSync(path.dirname(folder), { recursive: true });
    mkdirSync(folder, { recursive: true, mode: 0o700 });
  }

  /** Resolves when the mail is on disk, and only then is the sender told that it was accepted. @param {string} from @param {string[]} to @param {Buffer} raw */
  async add(from, to, raw) {
    const receivedAt = new Date();
    const id = `${String(receivedAt.getTime()).padStart(15, '0')}-${String(process.hrtime.bigint() % 1_000_000_000n).padStart(9, '0')}-${randomBytes(3).toString('hex')}`;
    const stored = { id, receivedAt: receivedAt.toISOString(), from, to, raw: raw.toString('base64') };
    const draft = path.join(this.folder, `.${id}`);
    await writeFile(draft, JSON.stringify(stored), { mode: 0o600 });
    await rename(draft, path.join(this.folder, `${id}.json`));
  }

  /** @param {string} id @returns {Promise<Message | undefined>} */
  async find(id) {
    const known = this.#parsed.get(id);
    if (known !== undefined) return known;
    if (!/^[\da-f-]+$/.test(id)) return undefined;
    const text = await readFile(path.join(this.folder, `${id}.json`), 'utf8').catch(() => undefined);
    if (text === undefined) return undefined;
    const message = await parseMessage(JSON.parse(text));
    this.#parsed.set(id, message);
    return message;
  }

  /** Newest first. @param {{ to?: string }} [filter] @returns {Promise<Message[]>} */
  async list({ to } = {}) {
    const ids = readdirSync(this.folder).filter((name) => /^\d.*\.json$/.test(name)).map((name) => name.slice(0, -'.json'.length)).sort().reverse();
    const messages = (await Promise.all(ids.map((id) => this.find(id)))).flatMap((message) => message ?? []);
    return to === undefined ? messages : messages.filter((message) => message.to.some((address) => address.toLowerCase() === to.toLowerCase()));
  }
}
