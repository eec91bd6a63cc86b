import { environment } from './environment';

export interface ReceivedMail {
  messageId: string;
  to: string[];
  from: string;
  subject: string;
  text: string;
  html: string;
}

/** What has arrived for an address, newest first. */
export async function readInbox(to: string): Promise<ReceivedMail[]> {
  const response = await fetch(`${environment.mailInboxUrl}/api/messages?to=${encodeURIComponent(to)}`);
  return (await response.json()) as ReceivedMail[];
}

/** Waits for the newest mail to an address. */
export async function waitForMail(to: string, timeoutMs = 15_000): Promise<ReceivedMail> {
  const end = Date.now() + timeoutMs;
  for (;;) {
    const [mail] = await readInbox(to);
    if (mail !== undefined) return mail;
    if (Date.now() > end) throw new Error(`No mail came within ${timeoutMs} ms.`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** The token of the link in a mail. */
export function tokenIn(mail: ReceivedMail): string {
  const token = /#token=([A-Za-z0-9_-]+)/.exec(mail.text)?.[1];
  if (token === undefined) throw new Error('The mail has no link.');
  return token;
}
