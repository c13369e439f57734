import { colours } from './face.js';
import { drawFoot } from './foot.js';
import type { MoneyDocument } from './money-document.js';
import { leadingOf, Paper, type TextStyle } from './paper.js';
import { partyLines } from './party.js';
import { Say } from './say.js';
import { drawTable, type Row } from './table.js';

const COMPANY: TextStyle = { size: 13, weight: 'semibold' };
const TITLE: TextStyle = { size: 26, weight: 'semibold' };
const LABEL: TextStyle = { size: 8, weight: 'medium', colour: colours.quiet };
const BODY: TextStyle = { size: 9.6 };
const QUIET: TextStyle = { size: 8.4, colour: colours.quiet };

/** An invoice, a receipt or the note of a refund as a PDF. The same input gives the same bytes. */
export async function moneyPdf(document: MoneyDocument): Promise<Buffer> {
  const { company, client, proposal, received } = document;
  const name = `${titleOf(document.kind)} ${document.number}`;
  const paper = new Paper({
    size: document.region === 'us' ? 'LETTER' : 'A4',
    title: name,
    author: company.name,
    subject: document.jobName,
    lang: 'en',
    madeAt: new Date(`${document.date}T00:00:00Z`),
  });
  const say = new Say(paper, document.currency, document.locale);
  paper.addPage();
  paper.bookmark(name);
  paper.doc.save().rect(paper.left, paper.y, 44, 4).fillColor(colours.lamp).fill().restore();
  paper.y += 14;
  paper.flow(company.name, COMPANY);
  const licence = company.licence.trim() === '' ? [] : [`Licence ${company.licence.trim()}`];
  paper.flow([...partyLines(company), ...licence].join(' · '), QUIET, { after: 20 });
  paper.flow(name, TITLE, { after: 10 });
  const facts: readonly (readonly [label: string, text: string])[] = [
    [toWhom(document.kind), [client.name, ...partyLines(client)].join('\n')],
    ['For', document.jobName],
    ['By agreement', `Proposal ${proposal.number} · revision ${proposal.revision}`],
    ['Date', say.date(document.date)],
  ];
  for (const [label, text] of facts) {
    if (text.trim() === '') continue;
    paper.need(leadingOf(LABEL) + leadingOf(BODY));
    paper.flow(label, LABEL);
    paper.flow(text, BODY, { after: 5 });
  }
  paper.y += 8;
  const rows: Row[] = document.lines.map((line) => ({ cells: [line.name, say.money(line.amountMinor)] }));
  rows.push({ cells: [totalOf(document.kind), say.money(document.totalMinor)], strong: true });
  drawTable(paper, [{ title: 'What for' }, { title: 'Amount', width: 130, align: 'right' }], rows);
  if (document.taxNote.trim() !== '') paper.flow(document.taxNote, QUIET, { after: 4 });
  if (received)
    paper.flow(receivedWords(document.kind, received.method, say.date(received.on)), BODY, { after: 6 });
  paper.y += 8;
  drawTable(
    paper,
    [{ title: 'On the whole of the agreed work' }, { title: 'Amount', width: 130, align: 'right' }],
    [
      { cells: ['Paid so far', say.money(document.paidMinor)] },
      { cells: ['Still to be paid', say.money(document.outstandingMinor)], strong: true },
    ],
  );
  paper.y += 8;
  for (const paragraph of document.terms.trim().split(/\n\s*\n/))
    paper.flow(paragraph.trim(), QUIET, { after: 4 });
  const what = `${name} · ${say.date(document.date)}`;
  return paper.finish((page, pages) => {
    drawFoot(paper, company.name, what, page, pages);
  });
}

function titleOf(kind: MoneyDocument['kind']): string {
  switch (kind) {
    case 'invoice':
      return 'Invoice';
    case 'receipt':
      return 'Receipt';
    case 'refund':
      return 'Refund';
  }
}

function toWhom(kind: MoneyDocument['kind']): string {
  switch (kind) {
    case 'invoice':
      return 'To';
    case 'receipt':
      return 'Received from';
    case 'refund':
      return 'Returned to';
  }
}

function totalOf(kind: MoneyDocument['kind']): string {
  switch (kind) {
    case 'invoice':
      return 'To be paid';
    case 'receipt':
      return 'Received';
    case 'refund':
      return 'Returned';
  }
}

function receivedWords(
  kind: MoneyDocument['kind'],
  method: NonNullable<MoneyDocument['received']>['method'],
  on: string,
): string {
  const how = methodWords(method);
  switch (kind) {
    case 'invoice':
    case 'receipt':
      return `Received ${how} on ${on}.`;
    case 'refund':
      return `Returned ${how} on ${on}.`;
  }
}

function methodWords(method: NonNullable<MoneyDocument['received']>['method']): string {
  switch (method) {
    case 'card':
      return 'by card';
    case 'cheque':
      return 'by cheque';
    case 'transfer':
      return 'by bank transfer';
    case 'cash':
      return 'in cash';
  }
}
