import { createHash } from 'node:crypto';
import { buffer } from 'node:stream/consumers';
import { Inject, Injectable, Logger } from '@nestjs/common';
import sharp from 'sharp';
import { NightPictures } from '../modules/proposals/night-pictures.js';
import { PartiesRepository } from '../modules/proposals/parties.repository.js';
import { LIGHT_PICTURE, lightKeyOf, PICTURE } from '../modules/proposals/pictures.js';
import { ProposalStore, picturesOf, type ShownRevision } from '../modules/proposals/proposal-store.js';
import { ProposalsRepository, type RevisionRow } from '../modules/proposals/proposals.repository.js';
import type { RevisionDocument } from '../modules/proposals/revision-document.js';
import { Sending, sendToSchema } from '../modules/proposals/sending.js';
import { proposalPdf } from '../paper/proposal-pdf.js';
import type { QueuePayloads } from '../ports/queue/queues.js';
import { ObjectStorage } from '../ports/storage/storage.js';
import type { JobHandler } from './job-handler.js';

/** Tried from the first on until the picture is light enough; the last is taken as it comes. */
const QUALITIES = [78, 70, 60, 50] as const;

/** Keeps a revision's pictures, makes its PDF, and sends it where that was asked for. */
@Injectable()
export class PrepareProposal implements JobHandler<'proposal.prepare'> {
  readonly queue = 'proposal.prepare';
  private readonly logger = new Logger('proposals');

  constructor(
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(PartiesRepository) private readonly parties: PartiesRepository,
    @Inject(NightPictures) private readonly nights: NightPictures,
    @Inject(Sending) private readonly sending: Sending,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  /** Called again for one that is ready, it only sends what still waits for it. */
  async handle({ companyId, revisionId }: QueuePayloads['proposal.prepare']): Promise<void> {
    const shown = await this.store.revision(companyId, revisionId);
    if (!shown) return;
    if (shown.row.status !== 'ready') {
      try {
        await this.prepare(shown);
      } catch (error) {
        // Told as failed until another try makes it.
        await this.repository.updateRevision(companyId, revisionId, {
          status: 'failed',
          failure:
            'The PDF could not be made. It is tried again for a while; if it stays so, make a new revision.',
        });
        throw error;
      }
    }
    await this.sendIfAsked(companyId, revisionId);
  }

  private async prepare({ row, document }: ShownRevision): Promise<void> {
    const { companyId, id } = row;
    await this.repository.updateRevision(companyId, id, {
      status: 'preparing',
      progress: 10,
    });
    const pictures = await this.keepPictures(row, document);
    await this.repository.updateRevision(companyId, id, { progress: 40, pictures: pictures.keys });
    const kept = { row: { ...row, pictures: pictures.keys }, document };
    const nights = await this.nights.keep(kept, pictures.bytes);
    await this.repository.updateRevision(companyId, id, { progress: 70 });
    const pdf = await proposalPdf({
      document,
      hash: row.hash,
      pictures: pictures.bytes,
      nights,
      signature: null,
    });
    await this.repository.updateRevision(companyId, id, { progress: 90 });
    const pdfKey = `${companyId}/proposals/${id}/proposal.pdf`;
    await this.storage.put(pdfKey, pdf, 'application/pdf');
    await this.repository.updateRevision(companyId, id, {
      status: 'ready',
      progress: 100,
      failure: null,
      pdfKey,
      pdfHash: createHash('sha256').update(pdf).digest('hex'),
    });
  }

  /** Copies of their own: the sheet may be replaced or removed later, what the homeowner saw stays. */
  private async keepPictures(
    row: RevisionRow,
    { sheets }: RevisionDocument,
  ): Promise<{ keys: Record<string, string>; bytes: Map<string, Buffer> }> {
    const sources = await this.parties.pictures(
      row.companyId,
      sheets.map(({ id }) => id),
    );
    const kept = picturesOf(row);
    const keys: Record<string, string> = {};
    const bytes = new Map<string, Buffer>();
    for (const { id } of sheets) {
      const key = kept.get(id) ?? `${row.companyId}/proposals/${row.id}/sheet-${id}.jpg`;
      const picture = (await this.read(kept.get(id))) ?? (await this.reducedSource(sources.get(id)));
      if (!picture) {
        this.logger.warn({ revisionId: row.id, sheetId: id }, 'a sheet of a proposal has no picture');
        continue;
      }
      await this.storage.put(key, picture, 'image/jpeg');
      await this.storage.put(lightKeyOf(key), await reduced(picture, LIGHT_PICTURE), 'image/jpeg');
      keys[id] = key;
      bytes.set(id, picture);
    }
    return { keys, bytes };
  }

  private async reducedSource(key: string | undefined): Promise<Buffer | null> {
    const original = await this.read(key);
    return original && reduced(original, PICTURE);
  }

  private async read(key: string | undefined): Promise<Buffer | null> {
    const stored = key === undefined ? null : await this.storage.get(key);
    return stored && buffer(stored.stream);
  }

  private async sendIfAsked(companyId: string, revisionId: string): Promise<void> {
    const row = await this.repository.revision(companyId, revisionId);
    const asked = sendToSchema.safeParse(row?.sendTo);
    const proposal = row && (await this.repository.find(companyId, row.proposalId));
    if (asked.success && proposal) await this.sending.send(proposal, revisionId, asked.data);
  }
}

async function reduced(picture: Buffer, { edgePx, bytes }: typeof PICTURE | typeof LIGHT_PICTURE) {
  const small = await sharp(picture)
    .resize({ width: edgePx, height: edgePx, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: 'white' })
    .png({ compressionLevel: 1 })
    .toBuffer();
  let smallest = small;
  for (const quality of QUALITIES) {
    smallest = await sharp(small).jpeg({ quality, progressive: true, mozjpeg: true }).toBuffer();
    if (smallest.length <= bytes) break;
  }
  return smallest;
}
