/** @typedef {import('./mailbox.mjs').Message} Message */

/** @param {string} text */
export const escape = (text) => text.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`);

/** Text with its web addresses made into links. @param {string} text */
export function linkify(text) {
  return text
    .split(/(https?:\/\/[^\s<>"]+[^\s<>".,;:!?)\]])/)
    .map((piece, index) => (index % 2 === 1 ? `<a href="${escape(piece)}" rel="noreferrer">${escape(piece)}</a>` : escape(piece)))
    .join('');
}

const style = `
:root { color-scheme: light; }
* { box-sizing: border-box; }
body { margin: 0; background: #F6F3EC; color: #1B1F24; font: 15px/1.5 system-ui, sans-serif; }
main { max-width: 60rem; margin: 0 auto; padding: 2rem 1.5rem; }
h1 { font-size: 1.25rem; margin: 0 0 .25rem; }
h2 { font-size: 1.1rem; margin: 0 0 .75rem; overflow-wrap: anywhere; }
p.note { margin: 0 0 1.5rem; color: #5C6068; }
a { color: inherit; text-underline-offset: .15em; }
a:focus-visible, iframe:focus-visible { outline: 2px solid #1B1F24; outline-offset: 2px; }
.sheet { background: #FCFAF5; border: 1px solid #D9D2C3; }
table { width: 100%; border-collapse: collapse; }
th { text-align: left; font-weight: 600; border-bottom: 1px solid #8E8777; }
th, td { padding: .5rem .75rem; vertical-align: top; }
td { border-top: 1px solid #D9D2C3; overflow-wrap: anywhere; }
td.time { white-space: nowrap; font-variant-numeric: tabular-nums; }
article { padding: 1rem 1.25rem; margin-bottom: 1.25rem; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .1rem 1rem; margin: 0; }
dt { color: #5C6068; } dd { margin: 0; overflow-wrap: anywhere; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; margin: 0; font: 14px/1.5 ui-monospace, monospace; }
iframe { width: 100%; height: 34rem; border: 1px solid #D9D2C3; background: #FFF; display: block; }
h3 { font-size: .95rem; margin: 0 0 .5rem; }
@media print { body { background: none; } }
`;

/** @param {string} body */
const layout = (body) => `<!doctype html>
<html lang="en">
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Local mail</title>
<link rel="icon" href="data:,">
<style>${style}</style>
<main>${body}</main>
</html>
`;

/** @param {string} iso */
const time = (iso) => `<time datetime="${escape(iso)}">${escape(iso.replace('T', ' ').replace(/\.\d+Z$/, ' UTC'))}</time>`;

/** @param {Message[]} messages newest first */
export function renderInbox(messages) {
  const rows = messages.map(
    (message) => `<tr><td class="time">${time(message.receivedAt)}</td><td>${escape(message.to.join(', '))}</td><td>${escape(message.from)}</td>
<td><a href="/messages/${message.id}">${escape(message.subject) || '(no subject)'}</a></td></tr>`,
  );
  const table = `<table class="sheet"><thead><tr><th scope="col">Received</th><th scope="col">To</th><th scope="col">From</th><th scope="col">Subject</th></tr></thead><tbody>${rows.join('\n')}</tbody></table>`;
  const empty = '<article class="sheet"><p style="margin:0">No mail has arrived yet. Reload the page after something was sent.</p></article>';
  return layout(`<h1>Local mail</h1>
<p class="note">What the application sends on this machine ends here and goes to nobody. Newest first.</p>
${messages.length === 0 ? empty : table}`);
}

/** @param {Message} message */
export function renderMessage(message) {
  return layout(`<p class="note"><a href="/">Local mail</a></p>
<article class="sheet"><h2>${escape(message.subject) || '(no subject)'}</h2>
<dl><dt>To</dt><dd>${escape(message.to.join(', '))}</dd><dt>From</dt><dd>${escape(message.from)}</dd><dt>Received</dt><dd>${time(message.receivedAt)}</dd><dt>Message-ID</dt><dd>${escape(message.messageId)}</dd></dl></article>
<article class="sheet"><h3>Text</h3><pre>${linkify(message.text) || '(no text part)'}</pre></article>
<article class="sheet"><h3>HTML</h3>${
    message.html === ''
      ? '<p style="margin:0">(no HTML part)</p>'
      : // No scripts, no forms, no origin of its own; a link opens in a new tab.
        `<iframe title="HTML part of the mail" sandbox="allow-popups allow-popups-to-escape-sandbox" referrerpolicy="no-referrer" src="/messages/${message.id}/html"></iframe>`
  }</article>`);
}

export function renderMissing() {
  return layout('<h1>No such mail</h1><p><a href="/">Local mail</a></p>');
}
