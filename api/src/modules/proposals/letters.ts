import { formatMoney } from '@lampwright/geometry/price';
import type { Letter } from '../../ports/mail/letter.js';
import type { RevisionDocument } from './revision-document.js';

export interface ProposalMail {
  readonly document: RevisionDocument;
  readonly link: string;
  readonly pdfKey: string;
}

export const paperName = ({ number, revision }: Pick<RevisionDocument, 'number' | 'revision'>): string =>
  `proposal-${number}-${revision}.pdf`;

const day = ({ validUntil, locale }: RevisionDocument): string =>
  new Intl.DateTimeFormat(locale, { dateStyle: 'long', timeZone: 'UTC' }).format(
    new Date(`${validUntil}T00:00:00Z`),
  );

const totalOf = ({ price, currency, locale }: RevisionDocument): string =>
  formatMoney(price.combinations[0]?.totalMinor ?? 0, currency, locale);

/** From the company, in its name; answers go to it. */
const from = ({ company }: RevisionDocument) => ({
  signature: company.name,
  ...(company.email === '' ? {} : { replyTo: company.email }),
});

const paper = ({ document, pdfKey }: ProposalMail) => ({
  attachments: [{ key: pdfKey, fileName: paperName(document), type: 'application/pdf' }],
});

export function proposalLetter(mail: ProposalMail, message: string): Letter {
  const { document, link } = mail;
  const what = document.changes ? 'change order' : 'proposal';
  return {
    subject: `Your ${what} for ${document.job.property}: number ${document.number}`,
    paragraphs: [
      ...paragraphsOf(message),
      `The ${what} as offered comes to ${totalOf(document)} and holds until ${day(document)}. On the page behind the link you see your garden with its lights and what makes up each sum, and you can ask questions and approve.`,
    ],
    action: { label: `See the ${what}`, url: link },
    afterwards: ['The same is attached as a PDF. The link needs no account: whoever has it sees the page.'],
    ...from(document),
    ...paper(mail),
  };
}

export function reminderLetter(mail: ProposalMail): Letter {
  const { document, link } = mail;
  return {
    subject: `A reminder: proposal ${document.number} for ${document.job.property}`,
    paragraphs: [
      `Our proposal for ${document.job.property} is waiting for your answer. It holds until ${day(document)}.`,
      'If something is unclear or should be different, ask on the page or answer this mail. If it is not for you, you can say so there as well, and we will not remind you again.',
    ],
    action: { label: 'See the proposal', url: link },
    ...from(document),
    ...paper(mail),
  };
}

export function answerLetter(
  document: RevisionDocument,
  link: string,
  question: string,
  text: string,
): Letter {
  return {
    subject: `An answer to your question about ${document.job.property}`,
    paragraphs: [`You asked: ${question}`, ...paragraphsOf(text)],
    action: { label: 'See it on the page', url: link },
    ...from(document),
  };
}

const paragraphsOf = (text: string): string[] =>
  text
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.trim())
    .filter((paragraph) => paragraph !== '');
