import { mkdtemp, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import nodemailer from 'nodemailer';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startMail } from '../services/index.mjs';

interface Message {
  id: string;
  from: string;
  to: string[];
  subject: string;
  messageId: string;
  text: string;
  html: string;
}

let folder: string;
let mail: Awaited<ReturnType<typeof startMail>>;
beforeAll(async () => {
  folder = await mkdtemp(path.join(os.tmpdir(), 'masswright-mail-'));
  mail = await startMail({ directory: folder });
});
afterAll(async () => {
  await mail.stop();
  await rm(folder, { recursive: true, force: true });
});

const link = 'http://127.0.0.1:4600/reset#token=a_b-1';
async function send(to: string, subject: string, messageId?: string): Promise<void> {
  const transport = nodemailer.createTransport(mail.url);
  await transport.sendMail({
    from: 'Masswright <no-reply@masswright.example>',
    to,
    subject,
    messageId,
    text: `Open ${link}, then sign in.\n`,
    html: `<p>Open <a href="${link}">the page</a>.</p><script>document.title = 'ran'</script>`,
  });
  transport.close();
}
const list = async (query = '') => (await (await fetch(`${mail.inboxUrl}/api/messages${query}`)).json()) as Message[];

describe('the local mail server', () => {
  it('keeps what is sent, newest first, over a kill', async () => {
    await send('ada@example.com', 'First — ünïcode');
    await send('grace@example.com', 'Second');
    await mail.restart('SIGKILL');
    const messages = await list();
    expect(messages.map((message) => message.subject)).toEqual(['Second', 'First — ünïcode']);
    expect(messages[1]).toMatchObject({ from: 'no-reply@masswright.example', to: ['ada@example.com'] });
    expect(messages[1]?.text).toContain(link);
    expect(messages[1]?.html).toContain(link);
  });

  it('keeps a mail that is sent twice twice, and finds the mails of one person', async () => {
    for (let times = 0; times < 2; times++) await send('twice@example.com', 'Same', '<same@masswright.example>');
    const found = await list('?to=Twice@example.com');
    expect(found.map((message) => message.messageId)).toEqual(['<same@masswright.example>', '<same@masswright.example>']);
  });

  it('shows the text with links to press and the HTML where its scripts do not run', async () => {
    const [message] = await list('?to=ada@example.com');
    const page = await fetch(`${mail.inboxUrl}/messages/${message?.id}`);
    const body = await page.text();
    expect(body).toContain(`<a href="${link}"`);
    expect(body).toContain('<title>Local mail</title>');
    expect(body).toMatch(/<iframe [^>]*sandbox="allow-popups allow-popups-to-escape-sandbox"/);
    expect(body).not.toContain('<script');
    const html = await fetch(`${mail.inboxUrl}/messages/${message?.id}/html`);
    expect(html.headers.get('content-security-policy')).toMatch(/^sandbox allow-popups .*default-src 'none'/);
  });

  it('escapes what a sender wrote into the subject', async () => {
    await send('odd@example.com', '<img src=x onerror=alert(1)>');
    expect(await (await fetch(mail.inboxUrl)).text()).not.toContain('<img');
  });

  it('has no page for a mail that is not there', async () => {
    for (const place of ['/messages/00-1', '/messages/..%2f..%2fetc', '/elsewhere']) expect((await fetch(mail.inboxUrl + place)).status).toBe(404);
  });
});
