/** A file in object storage that goes with a letter. */
export interface LetterAttachment {
  /** Its key in object storage. */
  readonly key: string;
  /** What the recipient sees it called, with its extension. */
  readonly fileName: string;
  /** Media type: "application/pdf". */
  readonly type: string;
}

/** A plain letter: a few paragraphs, at most one thing to do. */
export interface Letter {
  readonly subject: string;
  readonly paragraphs: readonly string[];
  /** The one link of the letter. */
  readonly action?: { readonly label: string; readonly url: string };
  /** Said after the link: how long it lasts, what to do if it was not you. */
  readonly afterwards?: readonly string[];
  /** Must be in object storage when the letter is sent: it never goes out without one of them. */
  readonly attachments?: readonly LetterAttachment[];
  /** Where an answer goes, such as the company that sends it. */
  readonly replyTo?: string;
  /** At the foot, in place of the product's name: the company that sends it. */
  readonly signature?: string;
}

const escapes: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (sign) => escapes[sign] ?? sign);

const paragraph = (text: string) => `<p style="margin:0 0 16px">${escapeHtml(text)}</p>`;

/** The letter as plain text and as HTML. Mail programs know little CSS: all of it is on the elements. */
export function renderLetter({ subject, paragraphs, action, afterwards = [], signature }: Letter): {
  text: string;
  html: string;
} {
  const foot = signature?.trim() || 'Lampwright';
  const text = [...paragraphs, ...(action ? [`${action.label}:\n${action.url}`] : []), ...afterwards, foot];
  const button = action
    ? `<p style="margin:24px 0"><a href="${escapeHtml(action.url)}" style="display:inline-block;padding:12px 20px;background:#E8A33D;color:#16202E;font-weight:600;text-decoration:none;border-radius:4px">${escapeHtml(action.label)}</a></p>
<p style="margin:0 0 16px">If the button does not work, copy this address into your browser:<br><a href="${escapeHtml(action.url)}" style="color:#16202E;word-break:break-all">${escapeHtml(action.url)}</a></p>`
    : '';
  const html = `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><title>${escapeHtml(subject)}</title></head>
<body style="margin:0;padding:32px 16px;background:#FBF8F2;color:#16202E;font:16px/1.5 'Work Sans',Helvetica,Arial,sans-serif">
<div style="max-width:560px;margin:0 auto">
${paragraphs.map(paragraph).join('\n')}
${button}
${afterwards.map(paragraph).join('\n')}
<p style="margin:32px 0 0;padding-top:16px;border-top:1px solid #EDE6D8">${escapeHtml(foot)}</p>
</div>
</body>
</html>
`;
  return { text: `${text.join('\n\n')}\n`, html };
}
