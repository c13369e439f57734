import { testCards } from './cards.js';
import type { FakeSession } from './state.js';

const escapes: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' };
const escapeHtml = (text: string) => text.replace(/[&<>"]/g, (sign) => escapes[sign] ?? sign);

function money(amount: number, currency: string): string {
  const format = new Intl.NumberFormat('en-US', { style: 'currency', currency: currency.toUpperCase() });
  return format.format(amount / 10 ** (format.resolvedOptions().maximumFractionDigits ?? 2));
}

const frame = (title: string, body: string) => `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="robots" content="noindex">
<title>${escapeHtml(title)}</title>
<style>
body { margin: 0; padding: 32px 16px; background: #fbf8f2; color: #16202e; font: 16px/1.5 sans-serif; }
main { max-width: 460px; margin: 0 auto; }
h1 { font-size: 24px; line-height: 1.25; margin: 0 0 8px; }
.sum { font-size: 32px; font-weight: 600; margin: 0 0 24px; }
.note { padding: 12px 16px; border-left: 4px solid #b3261e; background: #fff; margin: 0 0 24px; }
button { display: block; width: 100%; min-height: 48px; margin: 0 0 12px; padding: 8px 16px; border: 1px solid #16202e;
  border-radius: 4px; background: #fff; color: inherit; font: inherit; text-align: left; cursor: pointer; }
button:focus-visible, a:focus-visible { outline: 3px solid #1f6feb; outline-offset: 2px; }
a { color: inherit; }
small { color: #4a5563; }
</style>
</head>
<body>
<main>
${body}
</main>
</body>
</html>
`;

/** The page on which a payer would give a card. Here they choose how it behaves. */
export function payPage(session: FakeSession, declined: boolean): string {
  const buttons = testCards.map(
    ({ id, label }) => `<button type="submit" name="card" value="${id}">${escapeHtml(label)}</button>`,
  );
  const back =
    session.cancelUrl === ''
      ? ''
      : `<p><a href="${escapeHtml(session.cancelUrl)}">Back without paying</a></p>`;
  return frame(
    'Pay by card (local stand-in)',
    `<h1>${escapeHtml(session.name)}</h1>
<p class="sum">${escapeHtml(money(session.amount, session.currency))}</p>
${declined ? '<p class="note" role="alert">The card was declined. Nothing was charged. Please try another one.</p>' : ''}
<form method="post">
${buttons.join('\n')}
</form>
${back}
<p><small>This page stands in for the card service on this computer. No money moves.</small></p>`,
  );
}

export function endPage(session: FakeSession): string {
  const [title, say] =
    session.status === 'complete'
      ? ['Already paid', 'This payment has been made. There is nothing more to do here.']
      : ['No longer open', 'This page is no longer open. Please begin the payment again.'];
  const back = session.cancelUrl === '' ? '' : `<p><a href="${escapeHtml(session.cancelUrl)}">Back</a></p>`;
  return frame(title, `<h1>${title}</h1>\n<p>${say}</p>\n${back}`);
}

export const nothingHere = (): string =>
  frame('Nothing here', '<h1>Nothing here</h1>\n<p>There is no payment at this address.</p>');
