import { formatMoney } from '@lampwright/geometry/price';
import type { Letter, LetterAttachment } from '../../ports/mail/letter.js';
import type { RevisionDocument } from '../proposals/revision-document.js';

const named = ({ changes, number, revision }: RevisionDocument): string =>
  `${changes ? 'change order' : 'proposal'} ${number}, revision ${revision}`;

const paragraphs = (text: string): string[] =>
  text
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.trim())
    .filter((paragraph) => paragraph !== '');

export interface Said {
  readonly document: RevisionDocument;
  /** Who said it, as the company knows them. */
  readonly name: string;
  /** Where an answer by mail would go. */
  readonly email: string;
  /** The job's proposal in the product. */
  readonly url: string;
}

/** To the company: somebody asked, or asked on. */
export function questionLetter({ document, name, email, url }: Said, about: string, text: string): Letter {
  return {
    subject: `${name} asks about ${document.job.name}`,
    paragraphs: [`${name} writes about ${about} (${named(document)}):`, ...paragraphs(text)],
    action: { label: 'Answer it', url },
    replyTo: email,
  };
}

/** To the company. */
export function declinedLetter({ document, name, email, url }: Said, reason: string): Letter {
  return {
    subject: `${document.job.name} was declined`,
    paragraphs: [
      `${name} has declined ${named(document)}.`,
      ...(reason === '' ? ['No reason was given.'] : ['The reason given:', ...paragraphs(reason)]),
      'Whoever it was sent to is not reminded of it any more. You can make a new revision and send that.',
    ],
    action: { label: 'See the proposal', url },
    replyTo: email,
  };
}

export interface Signed {
  readonly document: RevisionDocument;
  readonly typedName: string;
  readonly totalMinor: number;
  readonly attachment: LetterAttachment;
}

const sum = ({ document, totalMinor }: Signed): string =>
  formatMoney(totalMinor, document.currency, document.locale);

/** To the homeowner: their copy. */
export function copyLetter(signed: Signed, link: string): Letter {
  const { document, typedName, attachment } = signed;
  const { company } = document;
  return {
    subject: `Your copy: ${named(document)}, approved`,
    paragraphs: [
      `Thank you, ${typedName}. You have approved ${named(document)} of ${company.name} at ${sum(signed)}. The signed copy is attached; please keep it.`,
      'What is due and when, your papers and your questions stay on the page behind the link.',
    ],
    action: { label: 'See your proposal', url: link },
    attachments: [attachment],
    signature: company.name,
    ...(company.email === '' ? {} : { replyTo: company.email }),
  };
}

/** To the company: the yes, with the same copy. */
export function approvedLetter(signed: Signed, { email, url }: Pick<Said, 'email' | 'url'>): Letter {
  const { document, typedName, attachment } = signed;
  return {
    subject: `${document.job.name} is approved: ${sum(signed)}`,
    paragraphs: [
      `${typedName} has approved ${named(document)} at ${sum(signed)}. The signed copy is attached.`,
    ],
    action: { label: 'See the proposal', url },
    attachments: [attachment],
    replyTo: email,
  };
}
