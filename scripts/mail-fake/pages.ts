import type { Mail } from "./mailbox";

const STYLE = `
  body { font: 16px/1.5 Roboto, system-ui, sans-serif; color: #22302b; background: #f7f4ea; margin: 0 }
  main { max-width: 62rem; margin: 0 auto; padding: 1.5rem }
  h1 { font-size: 1.4rem; margin: 0 0 .25rem }
  table { border-collapse: collapse; width: 100%; background: #fffdf6 }
  th, td { text-align: left; padding: .5rem .75rem; border-bottom: 1px solid #cfc9b4; vertical-align: top }
  dt { font-weight: 600 } dd { margin: 0 0 .5rem }
  iframe { width: 100%; height: 36rem; border: 1px solid #cfc9b4; background: #fff }
  pre { white-space: pre-wrap; background: #fffdf6; border: 1px solid #cfc9b4; padding: 1rem }
  a { color: #0f4f6b } a:focus-visible, button:focus-visible { outline: 3px solid #0f4f6b; outline-offset: 2px }
  button { font: inherit; padding: .4rem .9rem }
`;

const escape = (text: string) =>
  text.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`);

function page(title: string, content: string): string {
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escape(title)}</title><style>${STYLE}</style></head>
<body><main>${content}</main></body>
</html>`;
}

const when = (mail: Mail) => `${mail.at.slice(0, 10)} ${mail.at.slice(11, 19)} UTC`;

/** All mails, newest first. */
export function listPage(mails: readonly Mail[]): string {
  const rows = mails
    .map(
      (mail) => `<tr><td>${when(mail)}</td><td>${escape(mail.to.join(", "))}</td>
        <td><a href="/mails/${escape(mail.id)}">${escape(mail.subject)}</a></td>
        <td>${mail.attachments.map((file) => escape(file.filename)).join(", ")}</td></tr>`,
    )
    .join("");
  const table = `<table><thead><tr><th scope="col">Accepted</th><th scope="col">To</th>
    <th scope="col">Subject</th><th scope="col">Files</th></tr></thead><tbody>${rows}</tbody></table>
    <form method="post" action="/mails/clear"><p><button>Remove all</button></p></form>`;
  return page(
    "Mails",
    `<h1>Mails</h1><p>What Wanewright would have sent. Nothing leaves this machine.
     <a href="/">Look again</a></p>${mails.length ? table : "<p>No mail has been sent yet.</p>"}`,
  );
}

/** One mail: its addresses, how it looks, its text, its files. */
export function mailPage(mail: Mail): string {
  const base = `/mails/${escape(mail.id)}`;
  const lines: [string, readonly string[]][] = [
    ["From", [mail.from]],
    ["To", mail.to],
    ["Copy", mail.cc],
    ["Blind copy", mail.bcc],
    ["Reply to", mail.replyTo],
    ["Accepted", [when(mail)]],
  ];
  const terms = lines
    .filter(([, values]) => values.length > 0)
    .map(([name, values]) => `<dt>${name}</dt><dd>${escape(values.join(", "))}</dd>`)
    .join("");
  const files = mail.attachments
    .map((file, index) => `<li><a href="${base}/files/${index}">${escape(file.filename)}</a></li>`)
    .join("");
  const view =
    mail.html === null
      ? ""
      : `<h2>As shown</h2><iframe title="The mail as shown" src="${base}/html"
         sandbox="allow-popups allow-popups-to-escape-sandbox"></iframe>`;
  return page(
    mail.subject,
    `<p><a href="/">All mails</a></p><h1>${escape(mail.subject)}</h1><dl>${terms}</dl>
     ${files ? `<h2>Files</h2><ul>${files}</ul>` : ""}${view}
     ${mail.text === null ? "" : `<h2>Text</h2><pre>${escape(mail.text)}</pre>`}`,
  );
}

/** The mail's own HTML; its links open beside the page. */
export function htmlView(mail: Mail): string {
  return `<base target="_blank">${mail.html ?? ""}`;
}

export function missingPage(): string {
  return page("Not found", `<h1>Not found</h1><p><a href="/">All mails</a></p>`);
}
