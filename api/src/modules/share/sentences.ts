import { formatMoney } from '@lampwright/geometry/price';
import { type Region, regionOf } from '../companies/settings.js';
import type { RevisionDocument } from '../proposals/revision-document.js';

/** What a homeowner agrees to, word for word: kept with the approval and printed over the signature. */
export interface Sentences {
  readonly approval: string;
  readonly consent: string;
}

export function sentencesOf({
  number,
  revision,
  region,
  company,
  changes,
  currency,
  locale,
}: RevisionDocument): Sentences {
  const what = changes ? 'change order' : 'proposal';
  const instead = changes
    ? ` It takes the place of revision ${changes.revision}, which I approved at ${formatMoney(changes.totalMinor, currency, locale)}.`
    : '';
  return {
    approval: `I approve ${what} ${number}, revision ${revision}, of ${company.name} with the parts I chose, at the total shown, and I agree to its scope, payment stages and terms.${instead} My typed name is my signature.`,
    consent: consentTo(regionOf(region)),
  };
}

/** Laws differ in what somebody must be told before they sign on a screen; none of these replaces advice. */
function consentTo(region: Region): string {
  switch (region) {
    case 'us':
      return 'I agree to sign electronically and to receive the records of this agreement electronically, on this page and by e-mail. I can open and keep PDF files on this device. I may ask the company for paper copies, and may withdraw this consent for later records by telling the company; what I signed before stays valid.';
    case 'eu':
    case 'uk':
      return 'I agree to conclude this agreement electronically and to receive its documents on a durable medium by e-mail, as PDF files that I can open and keep. I may ask the company for paper copies.';
  }
}
