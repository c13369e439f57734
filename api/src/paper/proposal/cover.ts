import { markPicture } from '../drawing/draw-sheet.js';
import type { SheetContent } from '../drawing/sheet-content.js';
import { colours } from '../face.js';
import { leadingOf, type TextStyle } from '../paper.js';
import { partyLines } from '../party.js';
import type { Picture } from '../pictures.js';
import { nameOf, QUIET, type Writing } from './parts.js';

const COMPANY: TextStyle = { size: 13, weight: 'semibold' };
const TITLE: TextStyle = { size: 26, weight: 'semibold' };
const LABEL: TextStyle = { size: 8, weight: 'medium', colour: colours.quiet };
const FACT: TextStyle = { size: 10 };
const TOTAL: TextStyle = { size: 22, weight: 'semibold' };
/** A picture lower than this is put on the next page instead. */
const LEAST_PICTURE = 190;
const STRIP = 74;

export interface CoverPicture {
  readonly content: SheetContent;
  readonly picture: Picture;
}

/** Who offers what to whom, the garden with its lights, and what it comes to. */
export function cover(writing: Writing, shown: CoverPicture | null): void {
  const { paper, document, say } = writing;
  paper.addPage();
  paper.bookmark(`Proposal ${document.number}`);
  paper.doc.save().rect(paper.left, paper.y, 44, 4).fillColor(colours.lamp).fill().restore();
  paper.y += 14;
  paper.flow(document.company.name, COMPANY);
  const { licence } = document.company;
  const lines = [
    ...partyLines(document.company),
    ...(licence.trim() === '' ? [] : [`Licence ${licence.trim()}`]),
  ];
  if (lines.length > 0) paper.flow(lines.join(' · '), QUIET);
  paper.y += 20;
  paper.flow(nameOf(document), TITLE, { after: 10 });
  facts(writing, [
    ['For', [document.client.name, ...partyLines(document.client)].join('\n')],
    ['Job', [document.job.name, document.job.property].filter((line) => line.trim() !== '').join('\n')],
    ['Date', say.date(document.madeAt)],
    ['Valid until', say.date(document.validUntil)],
  ]);
  if (document.changes) {
    const difference = writing.totals.totalMinor - document.changes.totalMinor;
    paper.flow(
      `Changes the approved revision ${document.changes.revision}, which came to ${say.money(document.changes.totalMinor)}: ${
        difference === 0
          ? 'the total stays the same'
          : `${say.money(Math.abs(difference))} ${difference > 0 ? 'more' : 'less'}`
      }.`,
      FACT,
      { after: 8 },
    );
  }
  if (shown) gardenPicture(writing, shown);
  totalStrip(writing);
}

/** Labels and what belongs to them, in two columns that flow. */
function facts({ paper }: Writing, all: readonly (readonly [label: string, text: string])[]): void {
  const gap = 20;
  const width = (paper.width - gap) / 2;
  for (let i = 0; i < all.length; i += 2) {
    const pair = all
      .slice(i, i + 2)
      .map(([label, text]) => ({ label, lines: paper.wrap(text, width, FACT) }));
    const count = Math.max(...pair.map(({ lines }) => lines.length));
    paper.need(leadingOf(LABEL) + Math.min(count, 8) * leadingOf(FACT));
    pair.forEach(({ label }, column) => {
      paper.line(label, paper.left + column * (width + gap), paper.y, LABEL);
    });
    paper.y += leadingOf(LABEL);
    for (let n = 0; n < count; n += 1) {
      paper.need(leadingOf(FACT));
      pair.forEach(({ lines }, column) => {
        paper.line(lines[n] ?? '', paper.left + column * (width + gap), paper.y, FACT);
      });
      paper.y += leadingOf(FACT);
    }
    paper.y += 8;
  }
}

function gardenPicture({ paper }: Writing, { content, picture }: CoverPicture): void {
  const { sheet, lights } = content;
  const caption = leadingOf(QUIET) + 4;
  const heightFor = (room: number) => Math.min(room, (paper.width * sheet.heightPx) / sheet.widthPx);
  if (heightFor(paper.room - STRIP - caption) < Math.min(LEAST_PICTURE, heightFor(LEAST_PICTURE)))
    paper.addPage();
  paper.y += 4;
  const height = heightFor(paper.room - STRIP - caption);
  const width = (height * sheet.widthPx) / sheet.heightPx;
  const left = paper.left + (paper.width - width) / 2;
  const frame = { left, top: paper.y, right: left + width, bottom: paper.y + height };
  const { doc } = paper;
  doc.image(picture.image, frame.left, frame.top, { width, height });
  const without = markPicture(paper, frame, lights, ({ x, y }) => ({
    x: frame.left + (x / sheet.widthPx) * width,
    y: frame.top + (y / sheet.heightPx) * height,
  }));
  doc
    .save()
    .lineWidth(0.6)
    .strokeColor(colours.ink)
    .rect(frame.left, frame.top, width, height)
    .stroke()
    .restore();
  paper.y = frame.bottom + 4;
  const offered = lights.some((light) => light.offered)
    ? ' Dashed: offered as an addition, not included.'
    : '';
  paper.flow(
    without.length === 0
      ? `The places of the lights, as in the schedule.${offered}`
      : `Lights are marked as in the schedule.${offered} Dots only, for want of room: ${without.join(', ')}.`,
    QUIET,
  );
}

function totalStrip({ paper, document, say, totals, signature, taken }: Writing): void {
  const included = document.lights.filter(({ groupId }) => groupId === null || taken.has(groupId));
  const count = included.reduce((sum, { quantity }) => sum + quantity, 0);
  paper.need(STRIP - 10);
  paper.y += 8;
  paper.rule(paper.y, colours.ink, 1);
  paper.y += 7;
  const tax = document.price.tax;
  const said = signature ? 'Total as approved' : 'Total as offered';
  const label = tax === null ? said : `${said}, ${tax.name} included`;
  const sum = say.money(totals.totalMinor);
  const sumWidth = paper.widthOf(sum, TOTAL);
  const top = paper.y;
  paper.lineTo(sum, paper.right, top, TOTAL);
  paper.flow(label, FACT, { width: paper.width - sumWidth - 16 });
  paper.flow(`${say.number(count)} ${count === 1 ? 'light' : 'lights'} included`, QUIET, {
    width: paper.width - sumWidth - 16,
  });
  paper.y = Math.max(paper.y, top + leadingOf(TOTAL));
}
