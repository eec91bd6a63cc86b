export interface Mail {
  subject: string;
  text: string;
  html: string;
}

const entities: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
const escape = (text: string): string => text.replace(/[&<>"']/g, (character) => entities[character] ?? character);
/** A line break in a name must not become a line of its own. */
const inline = (text: string): string => text.replace(/\s+/g, ' ').trim();

interface Letter {
  subject: string;
  paragraphs: string[];
  action: { label: string; url: string };
  closing: string;
}

function compose({ subject, paragraphs, action, closing }: Letter): Mail {
  const text = [...paragraphs, `${action.label}:\n${action.url}`, closing].join('\n\n');
  const paragraph = (content: string) => `<p style="margin:0 0 16px">${content}</p>`;
  const html = `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><title>${escape(subject)}</title></head>
<body style="margin:0;padding:32px 16px;background:#F6F3EC;color:#1B1F24;font:16px/1.5 Barlow,Arial,sans-serif">
<div style="max-width:520px;margin:0 auto;padding:28px 32px;background:#FCFAF5;border:1px solid #D9D2C3">
<p style="margin:0 0 20px;font-weight:600">Masswright</p>
${paragraphs.map((content) => paragraph(escape(content))).join('\n')}
${paragraph(`<a href="${escape(action.url)}" style="display:inline-block;padding:9px 16px;background:#B5401F;color:#FFFFFF;text-decoration:none">${escape(action.label)}</a>`)}
<p style="margin:0;color:#5C6068;font-size:14px">${escape(closing)}</p>
</div></body></html>`;
  return { subject, text: `${text}\n`, html };
}

export function composeInvitation(invitation: { organisationName: string; invitedBy: string; role: string; url: string }): Mail {
  const organisation = inline(invitation.organisationName);
  const article = /^[aeiou]/i.test(invitation.role) ? 'an' : 'a';
  return compose({
    subject: `${inline(invitation.invitedBy)} invites you to ${organisation} on Masswright`,
    paragraphs: [
      `${inline(invitation.invitedBy)} invites you to join ${organisation} on Masswright as ${article} ${invitation.role}.`,
      'Masswright states what parts weigh, where they balance and how hard they are to turn.',
    ],
    action: { label: 'Accept the invitation', url: invitation.url },
    closing: 'The link works for seven days and once. If you do not know who sent this, you can leave it.',
  });
}

export function composePasswordReset(reset: { name: string; url: string }): Mail {
  return compose({
    subject: 'Set a new password for Masswright',
    paragraphs: [`Hello ${inline(reset.name)},`, 'somebody, we hope you, asked to set a new password for your account.'],
    action: { label: 'Set a new password', url: reset.url },
    closing: 'The link works for an hour and once. If it was not you, leave it: your password stays as it is.',
  });
}
