import type { StoredMail } from './store.ts';

function escape(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}

export const styleSheet = `
:root { color-scheme: light dark; --paper:#f6f5f0; --sheet:#fdfcf9; --ink:#14262b; --ink-2:#3f5257; --rule:#d3d9d4; --edge:#75868a; --mari:#7d4e06; --heron:#35577d; }
@media (prefers-color-scheme: dark) { :root { --paper:#111c1f; --sheet:#18262a; --ink:#e7ebe4; --ink-2:#b9c5c0; --rule:#26363a; --edge:#72878a; --mari:#e9b765; --heron:#8bafd8; } }
* { box-sizing: border-box; }
body { margin: 0; background: var(--paper); color: var(--ink); font: 14px/21px "Noto Sans", system-ui, sans-serif; }
main { max-width: 1000px; margin: 0 auto; padding: 32px 24px; }
h1 { font-size: 22px; line-height: 28px; margin: 0 0 8px; overflow-wrap: anywhere; }
h2 { font-size: 15px; margin: 24px 0 8px; }
p { margin: 0 0 16px; color: var(--ink-2); }
.note { color: var(--mari); }
a { color: var(--heron); }
table { width: 100%; border-collapse: collapse; font-size: 13px; }
th { text-align: left; font-weight: 500; color: var(--ink-2); border-bottom: 1.5px solid var(--ink); padding: 4px 12px 4px 0; }
td { border-bottom: 1px solid var(--rule); padding: 6px 12px 6px 0; vertical-align: top; overflow-wrap: anywhere; }
form { display: flex; gap: 8px; margin: 0 0 16px; flex-wrap: wrap; align-items: center; }
input { font: inherit; color: inherit; background: var(--sheet); border: 1px solid var(--edge); padding: 4px 8px; min-height: 32px; width: min(22em, 100%); }
button { font: inherit; color: inherit; background: none; border: 1px solid var(--edge); padding: 4px 12px; min-height: 32px; cursor: pointer; }
:focus-visible { outline: 2px solid var(--ink); outline-offset: 2px; }
iframe { width: 100%; height: 70vh; border: 1px solid var(--edge); background: #fff; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; background: var(--sheet); padding: 12px; font: 12.5px/18px "Noto Sans Mono", ui-monospace, monospace; }
`;

function page(title: string, body: string): string {
  return `<!doctype html><html lang="en-GB"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1"><title>${escape(title)}</title><link rel="stylesheet" href="/stand-in.css"></head><body><main>${body}</main></body></html>`;
}

export function inboxPage(mails: readonly StoredMail[], recipient: string): string {
  const rows = mails
    .map(
      (mail) =>
        `<tr><td>${escape(mail.receivedAt)}</td><td>${escape(mail.to.join(', '))}</td><td><a href="/mails/${mail.id}">${escape(mail.subject)}</a></td></tr>`,
    )
    .join('');
  const list =
    mails.length === 0
      ? '<p>No mail here yet. What Millpond sends appears here, newest first.</p>'
      : `<table><thead><tr><th scope="col">Received (UTC)</th><th scope="col">To</th><th scope="col">Subject</th></tr></thead><tbody>${rows}</tbody></table>`;
  return page(
    'Mail stand-in',
    `<h1>Mail stand-in</h1><p class="note">A local mail server that keeps what it is given. Nothing leaves this machine.</p><form method="get" action="/"><label for="to">Recipient contains</label><input id="to" name="to" value="${escape(recipient)}"><button type="submit">Show</button></form>${list}`,
  );
}

export function mailPage(mail: StoredMail): string {
  const headers = mail.headers
    .map((entry) => `<tr><td>${escape(entry.name)}</td><td>${escape(entry.value)}</td></tr>`)
    .join('');
  const html =
    mail.html === null
      ? '<p>This mail has no HTML part.</p>'
      : `<iframe sandbox="" title="HTML part" src="/mails/${mail.id}/html"></iframe>`;
  return page(
    mail.subject,
    `<p><a href="/">All mails</a></p><h1>${escape(mail.subject)}</h1><p>To ${escape(mail.to.join(', '))}, from ${escape(mail.from)}, ${escape(mail.receivedAt)}</p><h2>HTML part</h2>${html}<h2>Text part</h2><pre>${escape(mail.text)}</pre><h2>Headers</h2><table><tbody>${headers}</tbody></table>`,
  );
}

export function missingPage(): string {
  return page(
    'Not found',
    '<h1>Not found</h1><p>There is no such mail. <a href="/">All mails</a></p>',
  );
}
