import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import type { PageHead } from '../../http/share-page.js';
import { picturedSheets } from '../proposals/pictures.js';
import { LIGHT_PICTURE_MEDIA, lightPictureUrl, pictureUrl } from './share-addresses.js';
import { ShownProposal } from './shown-proposal.js';

/** What the page of a link says before its script has asked for anything. */
@Injectable()
export class SharePageFacts {
  constructor(@Inject(ShownProposal) private readonly shown: ShownProposal) {}

  /** The picture that the page shows first is worth beginning with. */
  async headOf(guest: Guest): Promise<PageHead> {
    const { row, document } = await this.shown.of(guest);
    const [first] = picturedSheets(row, document);
    const what = document.changes ? 'Change order' : 'Proposal';
    return {
      title: `${what} ${document.number} for ${document.job.property} – ${document.company.name}`,
      picture: first
        ? {
            url: pictureUrl(guest.linkId, first.id),
            light: { url: lightPictureUrl(guest.linkId, first.id), media: LIGHT_PICTURE_MEDIA },
          }
        : null,
    };
  }
}
