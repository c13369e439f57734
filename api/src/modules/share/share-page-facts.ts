import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import type { PageHead } from '../../http/share-page.js';
import { picturesOf } from '../proposals/proposal-store.js';
import { pictureUrl } from './share-addresses.js';
import { ShownProposal } from './shown-proposal.js';

/** What the page of a link says before its script has asked for anything. */
@Injectable()
export class SharePageFacts {
  constructor(@Inject(ShownProposal) private readonly shown: ShownProposal) {}

  /** The first sheet is what one sees first: its picture is worth beginning with. */
  async headOf(guest: Guest): Promise<PageHead> {
    const { row, document } = await this.shown.of(guest);
    const kept = picturesOf(row);
    const first = document.sheets.find(({ id }) => kept.has(id));
    const what = document.changes ? 'Change order' : 'Proposal';
    return {
      title: `${what} ${document.number} for ${document.job.property} – ${document.company.name}`,
      pictures: first ? [pictureUrl(guest.linkId, first.id)] : [],
    };
  }
}
