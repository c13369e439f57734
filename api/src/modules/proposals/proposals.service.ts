import { createHash } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { conflict, notFound } from '../../http/app-error.js';
import { canonicalJson } from '../../http/canonical-json.js';
import type { StoredFile } from '../../http/send-file.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { Queue } from '../../ports/queue/queue.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { regionOf, settingsInForce } from '../companies/settings.js';
import { CountersRepository } from '../numbering/counters.repository.js';
import { type PricedPlan, Quotes } from '../pricing/quotes.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { buildDocument } from './build-document.js';
import { CompanyTexts } from './company-texts.js';
import { differencesOf, offeredTotal } from './differences.js';
import { paperName, proposalLetter } from './letters.js';
import { isLive, ProposalLinks } from './links.js';
import { PartiesRepository } from './parties.repository.js';
import { ProposalStore, type ShownRevision } from './proposal-store.js';
import {
  type JobWords,
  jobWordsSchema,
  type Proposal,
  type ProposalLink,
  type Revision,
  type RevisionDetail,
  type Send,
} from './proposals.dto.js';
import {
  type LinkRow,
  type ProposalRow,
  ProposalsRepository,
  type RevisionRow,
} from './proposals.repository.js';
import type { ProposalWords } from './revision-document.js';
import { Sending } from './sending.js';
import { linkOf, proposalStateOf, RevisionViews } from './views.js';

/** The company's side of proposals: words, revisions, sending, links. */
@Injectable()
export class ProposalsService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(PartiesRepository) private readonly parties: PartiesRepository,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
    @Inject(CompanyTexts) private readonly texts: CompanyTexts,
    @Inject(CountersRepository) private readonly counters: CountersRepository,
    @Inject(Quotes) private readonly quotes: Quotes,
    @Inject(ProposalLinks) private readonly links: ProposalLinks,
    @Inject(Sending) private readonly sending: Sending,
    @Inject(RevisionViews) private readonly views: RevisionViews,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(Outbox) private readonly outbox: Outbox,
    @Inject(Queue) private readonly queue: Queue,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  async get(actor: Actor, jobId: string): Promise<Proposal> {
    demand(actor, 'proposals.read');
    const { companyId } = actor;
    // Without solving anything: the present versions say whether the newest revision is stale.
    const bill = await this.quotes.bill(companyId, jobId);
    if (!bill) throw notFound('This job');
    const proposal = await this.repository.ofJob(companyId, jobId);
    const { words, own } = await this.wordsOf(actor, proposal);
    const revisions = proposal ? await this.views.all(proposal, jobId) : [];
    const links = proposal ? await this.repository.links(companyId, [proposal.id]) : [];
    const newest = proposal ? await this.newest(proposal) : null;
    return {
      // Its number is kept for it from the first words on, but nobody has seen it before a revision.
      number: revisions.length === 0 ? null : (proposal?.number ?? null),
      state: proposalStateOf(revisions),
      currency: bill.quote.currency,
      locale: bill.quote.locale,
      stale: newest !== null && isStale(newest, bill),
      words,
      own,
      revisions,
      links: links.map(linkOf),
    };
  }

  /** The job's own words; what is left out is the company's. */
  async setWords(actor: Actor, jobId: string, words: JobWords): Promise<Proposal> {
    demand(actor, 'proposals.edit');
    await this.database.transaction(async () => {
      await this.editableJob(actor, jobId);
      const proposal = await this.proposalOf(actor, jobId);
      await this.repository.setTexts(actor.companyId, proposal.id, words);
    });
    return this.get(actor, jobId);
  }

  /**
   * Freezes plan, price and words as they are now into a new revision.
   * @throws AppError 409 `not-ready` with what stands in the way
   */
  async freeze(actor: Actor, jobId: string): Promise<Revision> {
    demand(actor, 'proposals.edit');
    const { companyId } = actor;
    await this.editableJob(actor, jobId);
    const worked = await this.quotes.work(companyId, jobId);
    const about = await this.parties.ofJob(companyId, jobId);
    const company = await this.companies.find(companyId);
    const texts = await this.texts.inForce(companyId);
    if (!worked || !about || !company || !texts) throw notFound('This job');
    if (worked.obstacles.length > 0)
      throw conflict('not-ready', worked.obstacles.map(({ message }) => message).join(' '), {
        obstacles: worked.obstacles,
      });
    const proposal = await this.proposalOf(actor, jobId);
    const revisions = await this.repository.revisions(companyId, [proposal.id]);
    const approved = await this.store.approved(companyId, proposal.id);
    const document = buildDocument(
      worked,
      {
        ...about,
        company,
        settings: settingsInForce(regionOf(company.region), company.settings),
        texts: texts.texts,
        words: (await this.wordsOf(actor, proposal)).words,
      },
      {
        number: proposal.number,
        revision: (revisions[0]?.revision ?? 0) + 1,
        changes: approved && {
          revision: approved.row.revision,
          hash: approved.row.hash,
          totalMinor: approved.approval.totalMinor,
        },
        agreed: approved && {
          known: approved.document.price.groups.map(({ id }) => id),
          taken: approved.approval.groups as string[],
        },
        madeAt: new Date(),
      },
    );
    const bytes = canonicalJson(document);
    const row = await this.repository.insertRevision({
      companyId,
      proposalId: proposal.id,
      revision: document.revision,
      planVersion: worked.planVersion,
      document: bytes,
      hash: createHash('sha256').update(bytes, 'utf8').digest('hex'),
      changesRevisionId: approved?.row.id ?? null,
      totalMinor: offeredTotal(document),
      costMinor: worked.quote.margin?.costMinor ?? null,
      validUntil: new Date(`${document.validUntil}T00:00:00Z`),
      createdBy: actor.userId,
    });
    await this.queue.send('proposal.prepare', { companyId, revisionId: row.id });
    const person = await this.actorOf(actor);
    const { revision, totalMinor } = row;
    await this.events.note(
      { companyId, jobId },
      'proposal-frozen',
      { revision, amountMinor: totalMinor },
      person,
    );
    return this.views.one(proposal, jobId, row.id);
  }

  async detail(actor: Actor, jobId: string, revisionId: string): Promise<RevisionDetail> {
    demand(actor, 'proposals.read');
    const { proposal, shown } = await this.revisionOf(actor, jobId, revisionId);
    const before = await this.before(proposal, shown.row);
    return {
      revision: await this.views.one(proposal, jobId, revisionId),
      document: shown.document,
      differences: before && differencesOf(before.document, shown.document),
    };
  }

  async pdf(actor: Actor, jobId: string, revisionId: string): Promise<StoredFile> {
    demand(actor, 'proposals.read');
    const { shown } = await this.revisionOf(actor, jobId, revisionId);
    return this.paper(shown.row.pdfKey, shown.row.pdfHash, paperName(shown.document));
  }

  async signedPdf(actor: Actor, jobId: string, revisionId: string): Promise<StoredFile> {
    demand(actor, 'proposals.read');
    const { shown } = await this.revisionOf(actor, jobId, revisionId);
    const approval = await this.store.approvalOf(shown.row);
    const name = paperName(shown.document).replace('proposal', 'approved');
    return this.paper(approval?.signedPdfKey ?? null, approval?.signedPdfHash ?? null, name);
  }

  /** Sends at once where the PDF is ready, otherwise as soon as it is. */
  async send(actor: Actor, jobId: string, revisionId: string, input: Send): Promise<Revision> {
    demand(actor, 'proposals.edit');
    await this.editableJob(actor, jobId);
    const { proposal, shown } = await this.lockedRevisionOf(actor, jobId, revisionId);
    const { row } = shown;
    if (row.withdrawnAt !== null) throw conflict('withdrawn', 'This revision was withdrawn. Make a new one.');
    if (row.status === 'failed')
      throw conflict('not-made', 'The PDF of this revision could not be made. Make a new revision.');
    const newer = await this.repository.newestSent(actor.companyId, proposal.id);
    if (newer && newer.revision > row.revision)
      throw conflict(
        'newer-sent',
        `Revision ${newer.revision} was sent already. Send that one, or make a new one.`,
      );
    if (await this.store.declineOf(row))
      throw conflict('declined', 'This revision was declined. Make a new one.');
    const since = await this.store.approvedSince(row);
    if (since)
      throw conflict(
        'approved-since',
        `Revision ${since.row.revision} was approved after this one was made, so that this one does not say what it changes. Make a new one: it will be a change order.`,
      );
    const person = await this.actorOf(actor);
    const sendTo = { ...input, byId: actor.userId, byName: person.name };
    if (row.status === 'ready') await this.sending.send(proposal, revisionId, sendTo);
    else await this.repository.updateRevision(actor.companyId, revisionId, { sendTo });
    return this.views.one(proposal, jobId, revisionId);
  }

  async withdraw(actor: Actor, jobId: string, revisionId: string): Promise<Revision> {
    demand(actor, 'proposals.edit');
    return this.database.transaction(async () => {
      const { proposal, shown } = await this.lockedRevisionOf(actor, jobId, revisionId);
      if (await this.store.approvalOf(shown.row))
        throw conflict('approved', 'This revision is approved. Change it by a change order.');
      if (shown.row.withdrawnAt === null) {
        await this.repository.updateRevision(actor.companyId, revisionId, {
          withdrawnAt: new Date(),
          sendTo: null,
        });
        const key = { companyId: actor.companyId, jobId };
        const { revision } = shown.row;
        await this.events.note(key, 'revision-withdrawn', { revision }, await this.actorOf(actor));
      }
      return this.views.one(proposal, jobId, revisionId);
    });
  }

  /**
   * Lets the crew work from a revision. It was frozen without a fault that nobody answers for; the crew builds
   * what the homeowner was shown.
   */
  async release(actor: Actor, jobId: string, revisionId: string): Promise<Revision> {
    demand(actor, 'proposals.edit');
    return this.database.transaction(async () => {
      const { proposal, shown } = await this.lockedRevisionOf(actor, jobId, revisionId);
      if (shown.row.sentAt === null || shown.row.withdrawnAt !== null)
        throw conflict(
          'not-sent',
          'Only a revision that was sent and not withdrawn is released to the crew.',
        );
      if (shown.row.releasedAt === null) {
        await this.repository.updateRevision(actor.companyId, revisionId, {
          releasedAt: new Date(),
          releasedBy: actor.userId,
        });
        const key = { companyId: actor.companyId, jobId };
        const { revision } = shown.row;
        await this.events.note(key, 'revision-released', { revision }, await this.actorOf(actor));
      }
      return this.views.one(proposal, jobId, revisionId);
    });
  }

  /** The letter of the newest revision once more, by the same link. */
  async resend(actor: Actor, jobId: string, linkId: string): Promise<ProposalLink> {
    demand(actor, 'proposals.edit');
    const { proposal, link } = await this.linkOfJob(actor, jobId, linkId);
    if (!isLive(link, new Date()))
      throw conflict('link-gone', 'This link is no longer valid. Send the proposal anew.');
    const shown = await this.store.newestShown(actor.companyId, proposal.id);
    if (!shown || shown.row.pdfKey === null) throw conflict('not-sent', 'No revision was sent yet.');
    const mail = { document: shown.document, link: this.links.urlOf(link), pdfKey: shown.row.pdfKey };
    await this.outbox.post(
      actor.companyId,
      link.email,
      proposalLetter(mail, 'Here is our proposal once more.'),
    );
    const updated = await this.repository.updateLink(actor.companyId, linkId, { lastMailAt: new Date() });
    const key = { companyId: actor.companyId, jobId };
    const { revision, totalMinor } = shown.row;
    const data = { revision, to: [link.name || link.email], amountMinor: totalMinor };
    await this.events.note(key, 'proposal-sent', data, await this.actorOf(actor));
    return linkOf(updated);
  }

  /** Ends a link at once: for whoever holds it, the page is gone. */
  async revoke(actor: Actor, jobId: string, linkId: string): Promise<ProposalLink> {
    demand(actor, 'proposals.edit');
    return this.database.transaction(async () => {
      const { link } = await this.linkOfJob(actor, jobId, linkId);
      if (link.revokedAt !== null) return linkOf(link);
      const revoked = await this.repository.updateLink(actor.companyId, linkId, { revokedAt: new Date() });
      const key = { companyId: actor.companyId, jobId };
      const to = link.name || link.email;
      await this.events.note(key, 'link-revoked', { to }, await this.actorOf(actor));
      return linkOf(revoked);
    });
  }

  private async wordsOf(
    actor: Actor,
    proposal: ProposalRow | null,
  ): Promise<{ words: ProposalWords; own: string[] }> {
    const texts = await this.texts.inForce(actor.companyId);
    if (!texts) throw notFound('This company');
    const own = jobWordsSchema.catch({}).parse(proposal?.texts ?? {});
    return { words: { ...texts.texts.words, ...own }, own: Object.keys(own) };
  }

  /** The job's proposal, with a number of its own from the first time on. */
  private async proposalOf({ companyId, userId }: Actor, jobId: string): Promise<ProposalRow> {
    await this.repository.lockJob(companyId, jobId);
    return (
      (await this.repository.ofJob(companyId, jobId)) ??
      this.repository.insert({
        companyId,
        jobId,
        number: await this.counters.next(companyId, 'proposal'),
        createdBy: userId,
      })
    );
  }

  private async editableJob({ companyId }: Actor, jobId: string): Promise<void> {
    const job = await this.repository.lockJob(companyId, jobId);
    if (!job) throw notFound('This job');
    if (job.archivedAt !== null)
      throw conflict('job-archived', 'This job is archived. Restore it to work on its proposal.');
  }

  private async revisionOf(
    actor: Actor,
    jobId: string,
    revisionId: string,
  ): Promise<{ proposal: ProposalRow; shown: ShownRevision }> {
    const proposal = await this.repository.ofJob(actor.companyId, jobId);
    const shown = proposal && (await this.store.revision(actor.companyId, revisionId));
    if (!shown || shown.row.proposalId !== proposal.id) throw notFound('This revision');
    return { proposal, shown };
  }

  /** As `revisionOf`, held: its PDF may become ready, or somebody may answer it, at this moment. */
  private async lockedRevisionOf(
    actor: Actor,
    jobId: string,
    revisionId: string,
  ): Promise<{ proposal: ProposalRow; shown: ShownRevision }> {
    const proposal = await this.repository.ofJob(actor.companyId, jobId);
    const shown = proposal && (await this.store.lockRevision(actor.companyId, revisionId));
    if (!shown || shown.row.proposalId !== proposal.id) throw notFound('This revision');
    return { proposal, shown };
  }

  private async linkOfJob(
    actor: Actor,
    jobId: string,
    linkId: string,
  ): Promise<{ proposal: ProposalRow; link: LinkRow }> {
    const proposal = await this.repository.ofJob(actor.companyId, jobId);
    const link = proposal && (await this.repository.link(actor.companyId, linkId));
    if (!link || link.proposalId !== proposal.id) throw notFound('This link');
    return { proposal, link };
  }

  private async newest(proposal: ProposalRow): Promise<ShownRevision | null> {
    const [row] = await this.repository.revisions(proposal.companyId, [proposal.id]);
    return row ? this.store.revision(proposal.companyId, row.id) : null;
  }

  /** What a revision is compared with: the approved one that it changes, or else the one before it. */
  private async before(proposal: ProposalRow, row: RevisionRow): Promise<ShownRevision | null> {
    if (row.changesRevisionId !== null) return this.store.revision(proposal.companyId, row.changesRevisionId);
    const all = await this.repository.revisions(proposal.companyId, [proposal.id]);
    const before = all.find(({ revision }) => revision < row.revision);
    return before ? this.store.revision(proposal.companyId, before.id) : null;
  }

  private async actorOf({ userId }: Actor): Promise<{ id: string; name: string }> {
    return { id: userId, name: (await this.parties.person(userId)).name };
  }

  private paper(key: string | null, hash: string | null, name: string): StoredFile {
    if (key === null || hash === null) throw notFound('This PDF');
    return {
      etag: `"${hash}"`,
      name,
      open: async () => {
        const stored = await this.storage.get(key);
        if (!stored) throw notFound('This PDF');
        return stored;
      },
    };
  }
}

/** Plan, groups or sums are others by now than in a revision. */
function isStale({ row, document }: ShownRevision, { planVersion, quote }: PricedPlan): boolean {
  if (row.planVersion !== planVersion) return true;
  const frozen = document.price.combinations.map(({ offerable: _, reason: __, ...totals }) => totals);
  // A change order has combinations in an order of its own: it begins with what was approved.
  const inOrder = document.changes === null ? asTheyAre : byGroups;
  const was = { groups: unnamedBase(document.price.groups), totals: inOrder(frozen) };
  return (
    canonicalJson(was) !==
    canonicalJson({ groups: unnamedBase(quote.groups), totals: inOrder(quote.combinations) })
  );
}

/** The base is named for homeowners as it is frozen. */
const unnamedBase = (groups: PricedPlan['quote']['groups']) =>
  groups.map((group) => (group.id === null ? { ...group, name: '' } : group));

type Combinations = PricedPlan['quote']['combinations'];
const asTheyAre = (all: Combinations): Combinations => all;
const byGroups = (all: Combinations): Combinations =>
  [...all].sort((a, b) => a.groups.join(' ').localeCompare(b.groups.join(' ')));
