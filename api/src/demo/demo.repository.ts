import { Inject, Injectable } from '@nestjs/common';
import { eq } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { clients, companies, jobs, memberships, properties, users } from '../database/schema/index.js';
import { demoClients, demoCompany, demoJobs, demoPeople, demoProperties } from './scenario.js';

const DAY_MS = 86_400_000;

/** Writes what the demo company begins with, under its fixed ids. */
@Injectable()
export class DemoRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async exists(): Promise<boolean> {
    const rows = await this.database.queries
      .select({ id: companies.id })
      .from(companies)
      .where(eq(companies.id, demoCompany.id));
    return rows.length > 0;
  }

  async insertPeople(passwordHash: string, now: Date): Promise<void> {
    const { queries } = this.database;
    await queries.insert(companies).values(demoCompany);
    for (const { id, name, email, role } of demoPeople) {
      await queries.insert(users).values({ id, name, email, passwordHash, emailConfirmedAt: now });
      await queries.insert(memberships).values({ companyId: demoCompany.id, userId: id, role });
    }
  }

  /** Jobs a few days apart, so that the list has an order to show. */
  async insertJobs(now: Date): Promise<void> {
    const { queries } = this.database;
    const companyId = demoCompany.id;
    await queries.insert(clients).values(demoClients.map((client) => ({ ...client, companyId })));
    await queries.insert(properties).values(demoProperties.map((property) => ({ ...property, companyId })));
    for (const [index, job] of demoJobs.entries()) {
      const createdAt = new Date(now.getTime() - (12 - 4 * index) * DAY_MS);
      const walkedAt = new Date(createdAt.getTime() + 2 * DAY_MS);
      const siteWalkOn =
        job.stage === 'enquiry' ? null : new Date(`${walkedAt.toISOString().slice(0, 10)}T00:00:00Z`);
      await queries.insert(jobs).values({ ...job, companyId, createdAt, updatedAt: createdAt, siteWalkOn });
    }
  }
}
