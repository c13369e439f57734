import type { PlanDocument } from '@lampwright/geometry/plan';
import type { Totals } from '@lampwright/geometry/price';
import type { RevisionDocument } from '../../modules/proposals/revision-document.js';
import { colours } from '../face.js';
import type { Paper, TextStyle } from '../paper.js';
import type { Say } from '../say.js';
import type { SignatureEvidence } from '../signature.js';

/** What the sections of a proposal are written from. */
export interface Writing {
  readonly paper: Paper;
  readonly say: Say;
  readonly document: RevisionDocument;
  readonly hash: string;
  readonly plan: PlanDocument;
  readonly signature: SignatureEvidence | null;
  /** The sums that hold: those approved, or else those offered. */
  readonly totals: Totals;
  /** Ids of the groups that are in. */
  readonly taken: ReadonlySet<string>;
}

export const SECTION: TextStyle = { size: 15, weight: 'semibold' };
export const HEADING: TextStyle = { size: 10.5, weight: 'semibold' };
export const BODY: TextStyle = { size: 9.4 };
export const QUIET: TextStyle = { size: 8.4, colour: colours.quiet };

/** A section of the document on a page of its own, to be found in the outline. */
export function section(paper: Paper, title: string): void {
  paper.addPage();
  paper.bookmark(title);
  paper.flow(title, SECTION, { after: 8 });
}

/** A heading that keeps at least the first lines of what follows it. */
export function heading(paper: Paper, title: string, style: TextStyle = HEADING): void {
  if (paper.y > paper.top + 40) paper.y += 8;
  paper.need(58);
  paper.flow(title, style, { after: 3 });
}

/** Text with paragraphs parted by empty lines. */
export function paragraphs(paper: Paper, text: string): void {
  for (const paragraph of text.trim().split(/\n\s*\n/)) paper.flow(paragraph.trim(), BODY, { after: 5 });
}

/** "Proposal 1042 · revision 2". */
export const nameOf = ({ number, revision }: RevisionDocument): string =>
  `Proposal ${number} · revision ${revision}`;
