import { formatMoney } from '@lampwright/geometry/price';
import type { MoneyDocument } from '../../paper/money-document.js';
import type { Letter, LetterAttachment } from '../../ports/mail/letter.js';

type Named = Pick<MoneyDocument, 'kind' | 'number'>;

/** "Invoice 1001". */
export function paperName({ kind, number }: Named): string {
  switch (kind) {
    case 'invoice':
      return `Invoice ${number}`;
    case 'receipt':
      return `Receipt ${number}`;
    case 'refund':
      return `Refund note ${number}`;
  }
}

export const paperFileName = (paper: Named): string =>
  `${paperName(paper).toLowerCase().replaceAll(' ', '-')}.pdf`;

const forThis = ({ lines }: MoneyDocument): string => lines.map(({ name }) => name).join(', ');

/** To the homeowner, with the paper. */
export function homeownerLetter(
  paper: MoneyDocument,
  name: string,
  attachment: LetterAttachment,
  byCard: boolean,
): Letter {
  const { company, currency, locale } = paper;
  const money = (amountMinor: number) => formatMoney(amountMinor, currency, locale);
  const amount = money(paper.totalMinor);
  const left =
    paper.outstandingMinor > 0
      ? `${money(paper.outstandingMinor)} of the agreed work is still to be paid, when it falls due.`
      : 'All of the agreed work is paid.';
  const about = {
    subject: `${paperName(paper)} from ${company.name}`,
    attachments: [attachment],
    signature: company.name,
    ...(company.email === '' ? {} : { replyTo: company.email }),
  };
  const hello = name === '' ? 'Hello,' : `Hello ${name},`;
  switch (paper.kind) {
    case 'invoice':
      return {
        ...about,
        paragraphs: [
          hello,
          `${company.name} asks you for ${amount}: ${forThis(paper)}, ${paper.jobName}. The invoice is attached.`,
          byCard
            ? 'You can pay it by card on the page of your proposal, by the link that you have, or as you agreed with the company.'
            : 'Please pay it as you agreed with the company.',
        ],
      };
    case 'receipt':
      return {
        ...about,
        paragraphs: [
          hello,
          `Thank you: ${amount} has come in for ${forThis(paper)}, ${paper.jobName}. The receipt is attached.`,
          left,
        ],
      };
    case 'refund':
      return {
        ...about,
        paragraphs: [
          hello,
          `${company.name} has paid ${amount} back to you for ${paper.jobName}. The note of it is attached.`,
          'Money that goes back to a card can take some days to show.',
        ],
      };
  }
}

/** To the company, when money came in or went back. */
export function companyLetter(paper: MoneyDocument, attachment: LetterAttachment): Letter {
  const { currency, locale, jobName, client } = paper;
  const amount = formatMoney(paper.totalMinor, currency, locale);
  const owed = formatMoney(paper.outstandingMinor, currency, locale);
  const came =
    paper.kind === 'refund'
      ? `${amount} has gone back to ${client.name} for ${jobName}.`
      : `${amount} has come in from ${client.name} for ${jobName}: ${forThis(paper)}.`;
  return {
    subject: `${paperName(paper)}: ${amount}, ${jobName}`,
    paragraphs: [came, `Still outstanding on this job: ${owed}.`],
    attachments: [attachment],
  };
}
