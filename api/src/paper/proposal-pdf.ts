import { frozenPlan } from '../modules/proposals/frozen-plan.js';
import type { RevisionDocument } from '../modules/proposals/revision-document.js';
import { planPage } from './drawing/plan-page.js';
import { type SheetContent, sheetsOf } from './drawing/sheet-content.js';
import { drawFoot } from './foot.js';
import type { NightPicture } from './night-picture.js';
import { Paper } from './paper.js';
import { type Picture, pictureFor } from './pictures.js';
import { cover } from './proposal/cover.js';
import { nightPage } from './proposal/night.js';
import { nameOf, type Writing } from './proposal/parts.js';
import { price } from './proposal/price.js';
import { schedule } from './proposal/schedule.js';
import { sign } from './proposal/sign.js';
import { terms } from './proposal/terms.js';
import { Say } from './say.js';
import type { SignatureEvidence } from './signature.js';

export interface ProposalPaper {
  readonly document: RevisionDocument;
  /** SHA-256 of the document's canonical bytes, in hex. */
  readonly hash: string;
  /** The sheets' pictures (JPEG, PNG or WebP) by sheet id; a sheet may have none. */
  readonly pictures: ReadonlyMap<string, Buffer>;
  /** Those of them that are shown by night, the one to be seen first leading. */
  readonly nights: readonly NightPicture[];
  /** Null while nobody has signed. */
  readonly signature: SignatureEvidence | null;
}

/** Digits of the hash at the foot of each page: enough to tell two revisions apart. */
const HASH_DIGITS = 12;

/**
 * The proposal as a PDF: cover, the garden by night, plan to scale, schedule, price, words, signature. The same input gives the
 * same bytes.
 * @throws where the document has no combination of prices, or a picture can't be read
 */
export async function proposalPdf({
  document,
  hash,
  pictures,
  nights,
  signature,
}: ProposalPaper): Promise<Buffer> {
  const totals = signature?.totals ?? document.price.combinations[0];
  if (!totals) throw new Error(`${nameOf(document)} has no price.`);
  const paper = new Paper({
    size: document.region === 'us' ? 'LETTER' : 'A4',
    title: [nameOf(document), document.job.name].filter((part) => part.trim() !== '').join(' – '),
    author: document.company.name,
    subject: `Landscape lighting for ${document.client.name}`,
    lang: 'en',
    madeAt: new Date(signature?.approvedAt ?? document.madeAt),
  });
  const plan = frozenPlan(document);
  const taken = new Set(totals.groups);
  const sheets = sheetsOf(plan, document.lights, taken);
  const opened = new Map<string, Picture>();
  for (const { sheet } of sheets) {
    const bytes = pictures.get(sheet.id);
    if (bytes) opened.set(sheet.id, await pictureFor(paper, bytes, sheet.view));
  }
  const say = new Say(paper, document.currency, document.locale);
  const writing: Writing = { paper, say, document, hash, plan, signature, totals, taken };
  cover(writing, brightest(sheets, opened));
  for (const night of nights) nightPage(writing, night);
  for (const content of sheets) planPage(paper, content, document, opened.get(content.sheet.id) ?? null);
  schedule(writing);
  price(writing);
  terms(writing);
  sign(writing);
  const what = `${nameOf(document)} · ${say.date(document.madeAt)} · hash ${hash.slice(0, HASH_DIGITS)}${signature ? ' · approved' : ''}`;
  return paper.finish((page, pages) => {
    drawFoot(paper, document.company.name, what, page, pages);
  });
}

/** The sheet with most lights among those that have a picture. */
function brightest(sheets: readonly SheetContent[], pictures: ReadonlyMap<string, Picture>) {
  let best: { content: SheetContent; picture: Picture } | null = null;
  for (const content of sheets) {
    const picture = pictures.get(content.sheet.id);
    if (picture && (!best || content.lights.length > best.content.lights.length)) best = { content, picture };
  }
  return best;
}
