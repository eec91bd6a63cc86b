// The local mail server as a process of its own. MAIL_DIRECTORY, MAIL_SMTP_PORT, MAIL_INBOX_PORT.
import { SMTPServer } from 'smtp-server';
import { startInbox } from './inbox.mjs';
import { Mailbox } from './mailbox.mjs';

const largestBytes = 25 * 1024 * 1024;
const directory = process.env.MAIL_DIRECTORY;
if (directory === undefined || directory === '') {
  console.error('MAIL_DIRECTORY must be set.');
  process.exit(78);
}
const mailbox = new Mailbox(directory);

const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ['STARTTLS', 'AUTH'],
  size: largestBytes,
  onData(stream, session, done) {
    /** @type {Buffer[]} */
    const chunks = [];
    stream.on('data', (/** @type {Buffer} */ chunk) => chunks.push(chunk));
    stream.once('end', () => {
      if (stream.sizeExceeded) return done(Object.assign(new Error('The message is too large.'), { responseCode: 552 }));
      const { mailFrom, rcptTo } = session.envelope;
      mailbox
        .add(mailFrom === false ? '' : mailFrom.address, rcptTo.map((recipient) => recipient.address), Buffer.concat(chunks))
        .then(() => done(), (error) => done(Object.assign(new Error(`Not kept: ${String(error)}`), { responseCode: 451 })));
    });
  },
});
// A client that hangs up is no reason to end.
smtp.on('error', (error) => console.error(JSON.stringify({ level: 'error', event: 'smtp-failed', message: error.message })));

const smtpPort = Number(process.env.MAIL_SMTP_PORT ?? 0);
await new Promise((resolve, reject) => {
  smtp.server.once('error', reject);
  smtp.listen(smtpPort, '127.0.0.1', () => resolve(undefined));
});
const inbox = await startInbox(mailbox, Number(process.env.MAIL_INBOX_PORT ?? 0));
console.log(JSON.stringify({ event: 'listening', smtp: smtp.server.address(), inbox: inbox.address() }));

for (const signal of ['SIGINT', 'SIGTERM']) {
  process.once(signal, () => {
    inbox.close();
    inbox.closeAllConnections();
    smtp.close(() => process.exit(0));
    setTimeout(() => process.exit(0), 2_000).unref();
  });
}
