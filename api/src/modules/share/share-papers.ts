import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import { notFound } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { Dues } from '../payments/dues.js';
import { paperName } from '../proposals/letters.js';
import { lightKeyOf } from '../proposals/pictures.js';
import { ProposalStore, picturesOf, type ShownRevision } from '../proposals/proposal-store.js';
import type { SharedPage } from './share.dto.js';
import { ShareRepository, type SignedApproval } from './share.repository.js';
import { paperUrl } from './share-addresses.js';

type Paper = SharedPage['papers'][number];

interface SignedPaper {
  readonly id: string;
  readonly approval: SignedApproval;
  readonly document: ShownRevision['document'];
}

const PROPOSAL = 'proposal';

/** Files of a guest's page: their own proposal, what was signed, papers about money, pictures. */
@Injectable()
export class SharePapers {
  constructor(
    @Inject(ShareRepository) private readonly repository: ShareRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(Dues) private readonly dues: Dues,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  async list({ companyId, proposalId, linkId }: Guest, shown: ShownRevision): Promise<Paper[]> {
    const urlOf = (paperId: string) => paperUrl(linkId, paperId);
    const { number, revision, changes } = shown.document;
    const signed = await this.signed(companyId, proposalId);
    return [
      {
        id: PROPOSAL,
        name: `${changes ? 'Change order' : 'Proposal'} ${number}, revision ${revision}`,
        url: shown.row.pdfKey === null ? null : urlOf(PROPOSAL),
      },
      ...signed.map(({ id, approval, document }) => ({
        id,
        name: `Your signed copy, revision ${document.revision}`,
        url: approval.signedPdfKey === null ? null : urlOf(id),
      })),
      ...(await this.dues.papers(companyId, proposalId, urlOf)),
    ];
  }

  async file({ companyId, proposalId }: Guest, shown: ShownRevision, paperId: string): Promise<StoredFile> {
    if (paperId === PROPOSAL)
      return this.stored(shown.row.pdfKey, shown.row.pdfHash, paperName(shown.document));
    const signed = (await this.signed(companyId, proposalId)).find(({ id }) => id === paperId);
    if (signed) {
      const { signedPdfKey, signedPdfHash } = signed.approval;
      const name = paperName(signed.document).replace('proposal', 'approved');
      return this.stored(signedPdfKey, signedPdfHash, name);
    }
    const money = await this.dues.paper(companyId, proposalId, paperId);
    if (!money) throw notFound('This paper');
    return money;
  }

  /** Only of what is shown, or was approved: sheets of other revisions are nobody's business. */
  async picture(
    { companyId, proposalId }: Guest,
    shown: ShownRevision,
    sheetId: string,
    light: boolean,
  ): Promise<StoredFile> {
    const approved = await this.store.approved(companyId, proposalId);
    const revisions = approved ? [shown, approved] : [shown];
    for (const { row } of revisions) {
      const key = picturesOf(row).get(sheetId);
      if (key === undefined) continue;
      // A revision's pictures never change.
      const tag = `${row.id}-${sheetId}`;
      return light ? this.lightPicture(key, tag) : this.stored(key, tag, undefined);
    }
    throw notFound('This picture');
  }

  /** Newest first: that one is `signed`, those before it `signed-<revision>`. */
  private async signed(companyId: string, proposalId: string): Promise<SignedPaper[]> {
    const papers: SignedPaper[] = [];
    for (const approval of await this.repository.approvals(companyId, proposalId)) {
      const shown = await this.store.revision(companyId, approval.revisionId);
      if (!shown) continue;
      const { document } = shown;
      papers.push({ id: papers.length === 0 ? 'signed' : `signed-${document.revision}`, approval, document });
    }
    return papers;
  }

  /** Or the other one where there is none, as in a revision made before there were any. */
  private lightPicture(key: string, tag: string): StoredFile {
    const whole = this.stored(key, tag, undefined);
    return {
      etag: `"${encodeURIComponent(`${tag}-light`)}"`,
      open: async () => (await this.storage.get(lightKeyOf(key))) ?? whole.open(),
    };
  }

  private stored(key: string | null, tag: string | null, name: string | undefined): StoredFile {
    if (key === null || tag === null) throw notFound('This paper');
    return {
      etag: `"${encodeURIComponent(tag)}"`,
      ...(name === undefined ? {} : { name }),
      open: async () => {
        const stored = await this.storage.get(key);
        if (!stored) throw new Error('A file of a proposal is not in object storage.');
        return stored;
      },
    };
  }
}
