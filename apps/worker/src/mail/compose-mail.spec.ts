import { describe, expect, it } from 'vitest';
import { composeInvitation } from './compose-mail';

describe('a mail', () => {
  const mail = composeInvitation({
    organisationName: 'Halyard <b>Kites</b>',
    invitedBy: 'Ines "IM" Marsh\nBcc: all@halyard.example',
    role: 'engineer',
    url: 'http://127.0.0.1:4600/invitation#token=abc',
  });
  it('has the link in its text and in its HTML', () => {
    expect(mail.text).toContain('http://127.0.0.1:4600/invitation#token=abc');
    expect(mail.html).toContain('href="http://127.0.0.1:4600/invitation#token=abc"');
  });
  it('shows names as text, never as markup, and on one line of the subject', () => {
    expect(mail.html).not.toContain('<b>Kites</b>');
    expect(mail.html).toContain('Halyard &lt;b&gt;Kites&lt;/b&gt;');
    expect(mail.subject).not.toMatch(/[\r\n]/);
  });
  it('says “an engineer” and “a reader”', () => {
    expect(mail.text).toContain('as an engineer.');
    expect(composeInvitation({ organisationName: 'A', invitedBy: 'B', role: 'reader', url: 'http://x' }).text).toContain('as a reader.');
  });
});
