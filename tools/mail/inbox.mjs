import http from 'node:http';
import { renderInbox, renderMessage, renderMissing } from './page.mjs';

/** @typedef {import('./mailbox.mjs').Mailbox} Mailbox */

const pagePolicy = "default-src 'none'; style-src 'unsafe-inline'; img-src data:; frame-src 'self'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'";
const mailPolicy = "sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'; style-src 'unsafe-inline'; img-src data:; frame-ancestors 'self'";

/**
 * @param {http.ServerResponse} response
 * @param {number} status
 * @param {string} type
 * @param {string} body
 * @param {string} [policy]
 */
function send(response, status, type, body, policy = pagePolicy) {
  response.writeHead(status, { 'content-type': `${type}; charset=utf-8`, 'content-security-policy': policy, 'x-content-type-options': 'nosniff', 'referrer-policy': 'no-referrer', 'cache-control': 'no-store' });
  response.end(body);
}

/** @param {Mailbox} mailbox @param {http.IncomingMessage} request @param {http.ServerResponse} response */
async function answer(mailbox, request, response) {
  if (request.method !== 'GET' && request.method !== 'HEAD') return send(response, 405, 'text/plain', 'Only reading is possible here.');
  const url = new URL(request.url ?? '/', 'http://inbox');
  if (url.pathname === '/') return send(response, 200, 'text/html', renderInbox(await mailbox.list()));
  if (url.pathname === '/api/messages') return send(response, 200, 'application/json', JSON.stringify(await mailbox.list({ to: url.searchParams.get('to') ?? undefined })));
  const [, folder, id = '', view, ...more] = url.pathname.split('/');
  const message = folder === 'messages' && more.length === 0 ? await mailbox.find(id) : undefined;
  if (message === undefined || (view !== undefined && view !== 'html')) return send(response, 404, 'text/html', renderMissing());
  // Links in a frame can't leave it by themselves, so they are told to open a tab of their own.
  if (view === 'html') return send(response, 200, 'text/html', `<base target="_blank">${message.html}`, mailPolicy);
  return send(response, 200, 'text/html', renderMessage(message));
}

/** The page on which people read what was sent. @param {Mailbox} mailbox @param {number} port @returns {Promise<http.Server>} */
export function startInbox(mailbox, port) {
  const server = http.createServer((request, response) => {
    answer(mailbox, request, response).catch((error) => {
      console.error(JSON.stringify({ level: 'error', event: 'inbox-failed', message: String(error) }));
      if (!response.headersSent) send(response, 500, 'text/plain', 'The inbox failed; see its log.');
    });
  });
  return new Promise((resolve, reject) => server.once('error', reject).listen(port, '127.0.0.1', () => resolve(server)));
}
