import type { StandInPerson } from './people.ts';

function escape(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}

/** Served as its own file, so that no page carries inline style or script. */
export const styleSheet = `
:root { color-scheme: light dark; --paper:#f6f5f0; --sheet:#fdfcf9; --ink:#14262b; --ink-2:#3f5257; --rule:#d3d9d4; --edge:#75868a; --mari:#7d4e06; --heron:#35577d; }
@media (prefers-color-scheme: dark) { :root { --paper:#111c1f; --sheet:#18262a; --ink:#e7ebe4; --ink-2:#b9c5c0; --rule:#26363a; --edge:#72878a; --mari:#e9b765; --heron:#8bafd8; } }
* { box-sizing: border-box; }
body { margin: 0; background: var(--paper); color: var(--ink); font: 14px/21px "Noto Sans", system-ui, sans-serif; }
main { max-width: 720px; margin: 0 auto; padding: 48px 24px; }
h1 { font-size: 22px; line-height: 28px; margin: 0 0 8px; }
p { margin: 0 0 16px; color: var(--ink-2); }
.note { color: var(--mari); }
ul { list-style: none; margin: 0; padding: 0; border-top: 1.5px solid var(--ink); }
li { border-bottom: 1px solid var(--rule); }
button { display: grid; grid-template-columns: minmax(9em, 14em) 1fr; gap: 4px 16px; width: 100%; min-height: 44px; align-items: center; text-align: left; border: 0; background: none; color: inherit; font: inherit; padding: 6px 4px; cursor: pointer; }
button:hover { background: var(--sheet); }
button b { color: var(--heron); text-decoration: underline; text-underline-offset: 2px; }
button span { color: var(--ink-2); }
button:focus-visible { outline: 2px solid var(--ink); outline-offset: 2px; }
.plain { display: inline-block; width: auto; border: 1px solid var(--edge); padding: 6px 16px; }
@media (max-width: 520px) { button { grid-template-columns: 1fr; } main { padding: 24px 16px; font-size: 16px; } }
`;

function page(title: string, body: string): string {
  return `<!doctype html><html lang="en-GB"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1"><title>${title}</title><link rel="stylesheet" href="/stand-in.css"></head><body><main>${body}</main></body></html>`;
}

export function choosePage(uid: string, people: readonly StandInPerson[]): string {
  const rows = people
    .map(
      (entry) =>
        `<li><button type="submit" name="sub" value="${escape(entry.sub)}"><b>${escape(entry.name)}</b><span>${escape(entry.roles.join(', '))}: ${escape(entry.note)}</span></button></li>`,
    )
    .join('');
  return page(
    'Choose a demo person',
    `<h1>Choose a demo person</h1><p class="note">Local stand-in for your organisation’s sign-in. Nothing here is a real account, and no password is asked.</p><form method="post" action="/interaction/${escape(uid)}"><ul>${rows}</ul></form>`,
  );
}

export function messagePage(title: string, sentence: string): string {
  return page(escape(title), `<h1>${escape(title)}</h1><p>${escape(sentence)}</p>`);
}

/** The provider hands over a form that only needs its button; one click ends the session. */
export function signOutPage(form: string): string {
  return page(
    'Sign out',
    `<h1>Sign out</h1><p>Local stand-in for your organisation’s sign-in: end the session here too?</p>${form}<p><button class="plain" type="submit" form="op.logoutForm" name="logout" value="yes" autofocus>Sign out</button></p>`,
  );
}
