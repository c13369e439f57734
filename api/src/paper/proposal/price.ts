import { type PaymentStage, unitText } from '@lampwright/geometry/price';
import type { RevisionDocument } from '../../modules/proposals/revision-document.js';
import { colours } from '../face.js';
import { leadingOf } from '../paper.js';
import type { Say } from '../say.js';
import { type Column, drawTable, type Row } from '../table.js';
import { BODY, HEADING, heading, QUIET, section, type Writing } from './parts.js';

type Group = RevisionDocument['price']['groups'][number];

const LINES: readonly Column[] = [{ title: 'Item' }, { title: 'Quantity', width: 72, align: 'right' }];
const PRICED: readonly Column[] = [...LINES, { title: 'Price', width: 96, align: 'right' }];
const SUMS: readonly Column[] = [{ title: 'Sum' }, { title: 'Amount', width: 130, align: 'right' }];
const STAGES: readonly Column[] = [
  { title: 'Stage' },
  { title: 'Due', width: 130 },
  { title: 'Share', width: 70, align: 'right' },
  { title: 'Amount', width: 110, align: 'right' },
];

/** What is in the price, what it adds up to, when it is paid, and what is offered apart. */
export function price(writing: Writing): void {
  const { paper, document, taken } = writing;
  section(paper, 'Price');
  const { groups } = document.price;
  for (const group of groups) if (group.id === null || taken.has(group.id)) groupBlock(writing, group, true);
  sums(writing);
  stages(writing);
  const apart = groups.filter(({ id }) => id !== null && !taken.has(id));
  if (apart.length === 0) return;
  heading(paper, 'Additions, not included', { ...HEADING, size: 13 });
  paper.flow(
    'These can be taken as well. Their prices are before discount and tax, and no part of the total above.',
    QUIET,
    { after: 4 },
  );
  for (const group of apart) groupBlock(writing, group, false);
}

function groupBlock({ paper, say, document }: Writing, group: Group, included: boolean): void {
  const sum = say.money(group.priceMinor);
  const width = paper.width - paper.widthOf(sum, HEADING) - 16;
  heading(paper, '');
  paper.y -= leadingOf(HEADING) + 3;
  paper.lineTo(sum, paper.right, paper.y, HEADING);
  paper.flow(included ? group.name : `Addition: ${group.name}`, HEADING, { width });
  const holds =
    group.fixtures > 0 ? `${say.number(group.fixtures)} ${group.fixtures === 1 ? 'light' : 'lights'}` : '';
  const about = [group.description.trim(), holds].filter((part) => part !== '').join(' · ');
  if (about !== '') paper.flow(about, QUIET, { width });
  paper.y += 3;
  const lines = document.price.lines.filter(({ groupId }) => groupId === group.id);
  const priced = lines.some(({ priceMinor }) => priceMinor !== null);
  drawTable(
    paper,
    priced ? PRICED : LINES,
    lines.map(({ name, quantity, unit, priceMinor }) => ({
      cells: [
        name,
        [say.number(quantity), unitText(unit, quantity)].filter((part) => part !== '').join('\u00a0'),
        ...(priced ? [priceMinor === null ? '' : say.money(priceMinor)] : []),
      ],
    })),
  );
}

function sums({ paper, say, document, totals, signature }: Writing): void {
  const { tax, discountName } = document.price;
  const rows: Row[] = [{ cells: ['Subtotal', say.money(totals.subtotalMinor)] }];
  if (totals.discountMinor > 0)
    rows.push({ cells: [discountName.trim() || 'Discount', say.money(-totals.discountMinor)] });
  if (tax) {
    const where = tax.jurisdiction.trim() === '' ? '' : ` (${tax.jurisdiction.trim()})`;
    rows.push({
      cells: [
        `${tax.name}${where}, ${say.percent(tax.percent)} of ${say.money(totals.taxableMinor)}`,
        say.money(totals.taxMinor),
      ],
    });
  }
  rows.push({
    cells: [signature ? 'Total as approved' : 'Total', say.money(totals.totalMinor)],
    strong: true,
  });
  paper.need(60 + rows.length * 20);
  heading(paper, 'What it comes to');
  drawTable(paper, SUMS, rows);
}

function stages({ paper, say, totals }: Writing): void {
  if (totals.stages.length === 0) return;
  paper.need(50 + totals.stages.length * 20);
  heading(paper, 'When it is paid');
  drawTable(
    paper,
    STAGES,
    totals.stages.map(({ name, due, percent, amountMinor, capped }) => ({
      cells: [name, dueWords(due), shareWords(say, percent, capped), say.money(amountMinor)],
    })),
  );
  if (totals.stages.some(({ capped }) => capped))
    paper.flow('The law caps what may be asked for before work begins; the rest falls due later.', {
      ...BODY,
      size: 8.4,
      colour: colours.quiet,
    });
}

const shareWords = (say: Say, percent: number | null, capped: boolean): string =>
  percent === null ? 'the rest' : capped ? 'as the law allows' : say.percent(percent);

function dueWords(due: PaymentStage['due']): string {
  switch (due) {
    case 'approval':
      return 'on approval';
    case 'start':
      return 'when work begins';
    case 'finish':
      return 'when work is finished';
  }
}
