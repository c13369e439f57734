import { colours } from '../face.js';
import { leadingOf, type TextStyle } from '../paper.js';
import { utcTime } from '../say.js';
import type { SignatureEvidence } from '../signature.js';
import { BODY, heading, nameOf, paragraphs, QUIET, section, type Writing } from './parts.js';

const LABEL: TextStyle = { size: 8, colour: colours.quiet };
const NAME: TextStyle = { size: 17, weight: 'medium' };

/** The block to be signed by hand, or what was signed on the page with its evidence. */
export function sign(writing: Writing): void {
  const { signature } = writing;
  if (signature) signed(writing, signature);
  else unsigned(writing);
}

function unsigned({ paper, document, say, totals, hash }: Writing): void {
  if (paper.room < 230) section(paper, 'Approval');
  else {
    paper.bookmark('Approval');
    heading(paper, 'Approval', { size: 15, weight: 'semibold' });
  }
  paper.flow(
    `I approve ${nameOf(document).toLowerCase()} at a total of ${say.money(totals.totalMinor)}.`,
    BODY,
    { after: 10 },
  );
  const gap = 24;
  const width = (paper.width - gap) / 2;
  for (const side of [
    `For the client: ${document.client.name}`,
    `For the company: ${document.company.name}`,
  ]) {
    const lines = paper.wrap(side, paper.width, { ...BODY, weight: 'medium' });
    paper.need(lines.length * leadingOf(BODY) + 60);
    paper.flow(side, { ...BODY, weight: 'medium' });
    paper.y += 30;
    ['Name and signature', 'Date'].forEach((label, i) => {
      const x = paper.left + i * (width + gap);
      paper.doc.save().lineWidth(0.6).strokeColor(colours.ink);
      paper.doc
        .moveTo(x, paper.y)
        .lineTo(x + width, paper.y)
        .stroke()
        .restore();
      paper.line(label, x, paper.y + 1, LABEL);
    });
    paper.y += 24;
  }
  paper.flow(`SHA-256 of the revision: ${hash}`, LABEL);
}

function signed({ paper, document, say }: Writing, evidence: SignatureEvidence): void {
  section(paper, 'Approved');
  paper.flow(`${nameOf(document)} was approved at ${say.money(evidence.totals.totalMinor)}.`, BODY, {
    after: 8,
  });
  const box = paper.y;
  paper.flow(evidence.typedName, NAME);
  paper.doc.save().lineWidth(0.8).strokeColor(colours.ink);
  paper.doc
    .moveTo(paper.left, paper.y + 1)
    .lineTo(paper.right, paper.y + 1)
    .stroke()
    .restore();
  paper.y = Math.max(paper.y, box) + 4;
  paper.flow(`Name as typed, on ${utcTime(evidence.approvedAt)}`, QUIET, { after: 6 });
  const taken = document.price.groups.filter(({ id }) => id !== null && evidence.groups.includes(id));
  heading(paper, 'What was approved');
  paper.flow(['Base', ...taken.map(({ name }) => name)].join('\n'), BODY, { after: 4 });
  heading(paper, 'What was agreed to');
  paragraphs(paper, evidence.agreedTo);
  heading(paper, 'Consent to electronic records');
  paragraphs(paper, evidence.consentedTo);
  heading(paper, 'Evidence');
  const facts: readonly (readonly [label: string, text: string])[] = [
    ['Time', utcTime(evidence.approvedAt)],
    ['Internet address', evidence.address],
    ['Browser', evidence.userAgent],
    ['SHA-256 of the revision', evidence.revisionHash],
    ['SHA-256 of the proposal’s PDF before signing', evidence.pdfHash],
  ];
  for (const [label, text] of facts) {
    paper.need(leadingOf(LABEL) + leadingOf(BODY));
    paper.flow(label, LABEL);
    paper.flow(text.trim() === '' ? 'not told' : text, BODY, { after: 4 });
  }
}
