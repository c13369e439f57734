import type { CaughtMail } from '../../ports/mail/caught-mail.js';
import { escapeHtml } from '../../ports/mail/letter.js';

const STYLE = `
:root { color-scheme: light dark; --ink: #16202E; --paper: #FBF8F2; --chalk: #EDE6D8; --quiet: #4A5568 }
@media (prefers-color-scheme: dark) { :root { --ink: #FBF8F2; --paper: #16202E; --chalk: #2B3A55; --quiet: #C9CED8 } }
* { box-sizing: border-box }
body { margin: 0; background: var(--paper); color: var(--ink); font: 14px/1.5 'Work Sans', system-ui, sans-serif; font-variant-numeric: tabular-nums }
main { max-width: 880px; margin: 0 auto; padding: 32px 16px 64px }
h1 { font-size: 22px; font-weight: 600; margin: 0 0 4px }
.quiet { color: var(--quiet); margin: 0 0 24px }
a { color: inherit; text-underline-offset: 3px }
a:focus-visible { outline: 2px solid; outline-offset: 2px }
table { width: 100%; border-collapse: collapse }
th, td { text-align: left; padding: 10px 12px 10px 0; border-bottom: 1px solid var(--chalk); vertical-align: top; overflow-wrap: anywhere }
th { font-weight: 600 }
ul { margin: 0 0 24px; padding: 0; list-style: none } li a { display: inline-block; min-height: 24px }
td a { display: inline-block; min-height: 24px }
dl { display: grid; grid-template-columns: max-content 1fr; gap: 4px 16px; margin: 0 0 24px }
dt { color: var(--quiet) } dd { margin: 0; overflow-wrap: anywhere }
pre { margin: 0 0 32px; padding: 20px; background: var(--chalk); border-radius: 4px; font: inherit; white-space: pre-wrap; overflow-wrap: anywhere }
iframe { width: 100%; height: 520px; border: 1px solid var(--chalk); border-radius: 4px; background: #FBF8F2 }
h2 { font-size: 16px; font-weight: 600; margin: 0 0 8px }
@media (max-width: 600px) { thead { display: none } tr { display: block; padding: 10px 0; border-bottom: 1px solid var(--chalk) } td { display: block; padding: 0; border: 0 } dl { grid-template-columns: 1fr } dd { margin-bottom: 8px } }
`;

const page = (title: string, body: string): string => `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="robots" content="noindex">
<title>${escapeHtml(title)}</title>
<style>${STYLE}</style>
</head>
<body><main>
${body}
</main></body>
</html>
`;

const time = (iso: string): string => `${iso.slice(0, 10)} ${iso.slice(11, 19)} UTC`;

export function listPage(mails: readonly CaughtMail[]): string {
  const rows = mails
    .map(
      ({ id, subject, to, receivedAt }) => `<tr>
<td><a href="/dev/mail/messages/${encodeURIComponent(id)}">${escapeHtml(subject || '(no subject)')}</a></td>
<td>${escapeHtml(to.join(', '))}</td>
<td><time datetime="${escapeHtml(receivedAt)}">${time(receivedAt)}</time></td>
</tr>`,
    )
    .join('\n');
  const table = `<table>
<thead><tr><th scope="col">Subject</th><th scope="col">To</th><th scope="col">Caught</th></tr></thead>
<tbody>
${rows}
</tbody></table>`;
  return page(
    'Local mail',
    `<h1>Local mail</h1>
<p class="quiet">Mail that Lampwright would have sent. Nothing leaves this machine.</p>
${mails.length > 0 ? table : '<p>No mail yet. Invite somebody, or ask for a new password, and it shows up here.</p>'}`,
  );
}

export function mailPage(mail: CaughtMail): string {
  return page(
    mail.subject,
    `<p><a href="/dev/mail">All mail</a></p>
<h1>${escapeHtml(mail.subject || '(no subject)')}</h1>
<p class="quiet"><time datetime="${escapeHtml(mail.receivedAt)}">${time(mail.receivedAt)}</time></p>
<dl>
<dt>From</dt><dd>${escapeHtml(mail.from)}</dd>
<dt>To</dt><dd>${escapeHtml(mail.to.join(', '))}</dd>
${mail.replyTo ? `<dt>Answers go to</dt><dd>${escapeHtml(mail.replyTo)}</dd>` : ''}
<dt>Message-ID</dt><dd>${escapeHtml(mail.messageId)}</dd>
</dl>
${attachments(mail)}
<pre>${withLinks(mail.text)}</pre>
${mail.html ? htmlPart(mail.html) : ''}`,
  );
}

const attachments = ({ id, attachments: files }: CaughtMail): string =>
  files.length === 0
    ? ''
    : `<h2>Attachments</h2>
<ul>
${files
  .map(
    ({ fileName, type, bytes }, index) =>
      `<li><a href="/dev/mail/messages/${encodeURIComponent(id)}/attachments/${index}">${escapeHtml(
        fileName || `Attachment ${index + 1}`,
      )}</a> <span class="quiet">${escapeHtml(type)}, ${Math.ceil(bytes / 1024)} KiB</span></li>`,
  )
  .join('\n')}
</ul>`;

/** The HTML part in a frame of its own, where no script runs; its links open in this window. */
const htmlPart = (html: string): string => `<h2>As HTML</h2>
<iframe title="The message as HTML" sandbox="allow-top-navigation-by-user-activation" srcdoc="${escapeHtml(
  `<base target="_top">${html}`,
)}"></iframe>`;

const withLinks = (text: string): string =>
  text
    .split(/(https?:\/\/[^\s<>"]+)/)
    .map((part, index) =>
      index % 2 === 1 ? `<a href="${escapeHtml(part)}">${escapeHtml(part)}</a>` : escapeHtml(part),
    )
    .join('');
