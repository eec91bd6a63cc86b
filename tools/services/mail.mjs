import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { isListening } from './object-storage.mjs';
import { findFreePort } from './ports.mjs';
import { Service, stopOrder } from './service.mjs';

const program = fileURLToPath(new URL('../mail/main.mjs', import.meta.url));

/**
 * @typedef {object} MailOptions
 * @property {string} directory
 * @property {number} [smtpPort]
 * @property {number} [inboxPort]
 * @property {string} [logFile]
 */

/**
 * A mail server that delivers to nobody but an inbox page, not started yet. `url` is for SMTP_URL, `inboxUrl` for people,
 * `inboxUrl/api/messages` for tests.
 * @param {MailOptions} options
 */
export async function prepareMail({ directory, smtpPort, inboxPort, logFile = path.join(directory, 'mail.log') }) {
  const port = smtpPort ?? (await findFreePort());
  const pagePort = inboxPort ?? (await findFreePort());
  const service = new Service({
    name: 'Mail',
    command: process.execPath,
    args: [program],
    env: { PATH: process.env.PATH, MAIL_DIRECTORY: directory, MAIL_SMTP_PORT: String(port), MAIL_INBOX_PORT: String(pagePort) },
    logFile,
    order: stopOrder.mail,
    isReady: async () => (await isListening(port)) && (await isListening(pagePort)),
  });
  return Object.assign(service, { port, url: `smtp://127.0.0.1:${port}`, inboxPort: pagePort, inboxUrl: `http://127.0.0.1:${pagePort}` });
}

/** @param {MailOptions} options */
export async function startMail(options) {
  const service = await prepareMail(options);
  await service.start();
  return service;
}
