import { type Region, wordsOf } from '../companies/settings.js';
import type { ProposalTexts } from './proposals.dto.js';

/**
 * The words that a company's proposals begin with. They are general on purpose: rights and duties differ
 * from place to place, and the company is asked to put in what holds where it works.
 */
export function usualTexts(region: Region): ProposalTexts {
  const { protectiveDevice } = wordsOf(region);
  return {
    words: {
      scope:
        'We supply and install the low-voltage lighting shown on the plan: fixtures and lamps, cable, splices, transformer and control. We set the control, aim the lights after dark, test every fixture with a meter and leave the site tidy.',
      exclusions: `Not included: work on the line-voltage side (an outdoor outlet with ${protectiveDevice} protection and an in-use cover is needed within reach of the transformer), repairs to private lines that nobody told us of, removal of rock, permits, and the restoration of planting beyond closing our trenches.`,
      timeline:
        'We agree a day to begin once the proposal is approved and the first payment has come in. Weather, ground and deliveries may move it; we tell you as soon as we know.',
      locate: locate(region),
      warranty:
        'We put right faults of our workmanship free of charge for two years from the day the work is signed off. Fixtures, lamps and the transformer carry the warranty of their makers, which we handle for you. Damage by others, by digging or by changes to the system is not covered.',
      terms:
        'The price holds until the date on the first page. What is to be done beyond the plan is agreed in writing, with its price, before we do it. Payments fall due as listed under the price. Materials stay ours until they are paid for. Estimates of volts and light assist judgement; local code and the instructions of the equipment come first.',
      cancellation: cancellation(region),
    },
    company: { email: '', phone: '', address: '', licence: '' },
    reminderDays: [3, 7],
  };
}

function locate(region: Region): string {
  switch (region) {
    case 'us':
      return 'We book the utility locate before any digging and wait until it stands. Please mark private lines (irrigation, gas to a grill or fire pit, pet fence), or show them to us: the locate service does not.';
    case 'eu':
    case 'uk':
      return 'We ask the network operators for the position of their lines before any digging. Please mark private lines (irrigation, gas to a grill or fire pit, pet fence), or show them to us: the operators’ plans do not hold them.';
  }
}

/** Which rights hold is a matter of local law; the text says of what kind they are, and where to look. */
function cancellation(region: Region): string {
  switch (region) {
    case 'us':
      return 'Where this agreement is made at your home, federal and state rules may give you the right to cancel within three business days of approving it, by a written notice to us, without penalty. State law may give you more time. We do not begin before that time has passed unless you ask for it in writing.';
    case 'eu':
      return 'As a consumer you may have the right to withdraw within 14 days of approving this proposal without giving a reason, by a clear statement to us. If you ask us to begin earlier, you pay for what was done until you withdraw. National law may add to this.';
    case 'uk':
      return 'As a consumer you may have the right to cancel within 14 days of approving this proposal without giving a reason, by a clear statement to us. If you ask us to begin earlier, you pay for what was done until you cancel.';
  }
}
