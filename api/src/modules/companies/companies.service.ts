import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { PasswordGate } from '../../access/password-gate.js';
import { SessionRepository } from '../../access/session.repository.js';
import { UsersRepository } from '../../access/users.repository.js';
import { Database } from '../../database/database.js';
import { badInput, notFound, notSignedIn } from '../../http/app-error.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { Queue } from '../../ports/queue/queue.js';
import type { Company, CompanyDeletion, CompanyEdit } from './companies.dto.js';
import { CompaniesRepository, type CompanyRow } from './companies.repository.js';
import { companyDeletedLetter } from './letters.js';
import { type CompanySettings, differencesFrom, regionOf, settingsInForce, wordsOf } from './settings.js';

/** Work that was under way when a company was deleted, such as a PDF, may store its file a little later. */
const LAST_FILE_AFTER_SECONDS = 3600;

@Injectable()
export class CompaniesService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
    @Inject(PasswordGate) private readonly gate: PasswordGate,
    @Inject(Queue) private readonly queue: Queue,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  async get(actor: Actor): Promise<Company> {
    demand(actor, 'company.read');
    return found(await this.companies.find(actor.companyId));
  }

  /** What the company works with where a plan or an item does not say otherwise. */
  async settings(actor: Actor): Promise<CompanySettings> {
    return (await this.get(actor)).settings;
  }

  async edit(actor: Actor, edit: CompanyEdit): Promise<Company> {
    demand(actor, 'company.edit');
    return this.database.transaction(async () => {
      const row = await this.companies.lock(actor.companyId);
      if (!row) throw notFound('This company');
      const region = edit.region ?? regionOf(row.region);
      const settings = { ...settingsInForce(region, row.settings), ...edit.settings };
      return found(
        await this.companies.update(actor.companyId, {
          name: edit.name ?? row.name,
          region,
          settings: differencesFrom(region, settings),
        }),
      );
    });
  }

  /**
   * Deletes the company with everything in it; files follow through the queue. Its members keep their
   * accounts, and their other companies.
   */
  async delete(actor: Actor, address: string, { password, name }: CompanyDeletion): Promise<void> {
    demand(actor, 'company.delete');
    const user = await this.users.find(actor.userId);
    if (!user) throw notSignedIn();
    const right = await this.gate.check(user.email, address, user.passwordHash, password);
    if (!right) throw badInput([{ pointer: '/password', detail: 'This is not your password.' }]);
    await this.database.transaction(async () => {
      const row = await this.companies.lock(actor.companyId);
      if (!row) throw notFound('This company');
      if (row.name !== name)
        throw badInput([{ pointer: '/name', detail: 'This is not the name of the company.' }]);
      const members = await this.memberships.listOfCompany(actor.companyId);
      await this.companies.delete(actor.companyId);
      for (const member of members) {
        const [next] = await this.memberships.listOfUser(member.userId);
        if (next) await this.sessions.moveFromNone(member.userId, next.id);
        if (member.role === 'owner')
          await this.outbox.post(null, member.email, companyDeletedLetter(member.name, row.name, user.name));
      }
      const files = { prefix: `${actor.companyId}/` };
      await this.queue.send('storage.delete', files);
      await this.queue.send('storage.delete', files, { startAfterSeconds: LAST_FILE_AFTER_SECONDS });
    });
  }
}

function found(row: CompanyRow | null): Company {
  if (!row) throw notFound('This company');
  const region = regionOf(row.region);
  return {
    id: row.id,
    name: row.name,
    region,
    settings: settingsInForce(region, row.settings),
    words: wordsOf(region),
    createdAt: row.createdAt.toISOString(),
  };
}
