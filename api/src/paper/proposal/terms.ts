import { BODY, heading, paragraphs, QUIET, section, type Writing } from './parts.js';

/** The words of the proposal, in the order in which a homeowner needs them. */
export function terms({ paper, say, document }: Writing): void {
  const { words, cautions, acceptedFaults } = document;
  const texts: readonly (readonly [title: string, text: string])[] = [
    ['What we do', words.scope],
    ['What is not part of it', words.exclusions],
    ['Timeline', words.timeline],
    ['Before any digging', words.locate],
    ['Warranty', words.warranty],
    ['Your right to cancel', words.cancellation],
    ['Terms', words.terms],
  ];
  const said = texts.filter(([, text]) => text.trim() !== '');
  if (said.length + cautions.length + acceptedFaults.length === 0) return;
  section(paper, 'Scope and terms');
  for (const [title, text] of said) {
    heading(paper, title);
    paragraphs(paper, text);
  }
  if (cautions.length > 0) {
    heading(paper, 'Cautions');
    for (const caution of cautions) listed(paper, caution);
  }
  if (acceptedFaults.length > 0) {
    heading(paper, 'Known and accepted');
    for (const { message, reason, by, at } of acceptedFaults) {
      listed(paper, message);
      paper.flow(`Accepted by ${by} on ${say.date(at)}: ${reason}`, QUIET, { x: paper.left + 12, after: 4 });
    }
  }
}

function listed(paper: Writing['paper'], text: string): void {
  const x = paper.left + 12;
  paper.need(20);
  paper.line('•', paper.left + 1, paper.y, BODY);
  paper.flow(text, BODY, { x, after: 3 });
}
