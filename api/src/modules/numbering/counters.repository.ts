import { Inject, Injectable } from '@nestjs/common';
import { sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { companyCounters } from '../../database/schema/index.js';

export type CounterName = 'proposal' | 'invoice' | 'receipt' | 'refund';

/** Where a company's numbers begin: small enough to say aloud, and not telling that it is the first. */
const FIRST = 1001;

/** Numbers without gaps: taken in the transaction of what they number, which others wait for. */
@Injectable()
export class CountersRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async next(companyId: string, name: CounterName): Promise<number> {
    const [row] = await this.database.queries
      .insert(companyCounters)
      .values({ companyId, name, last: FIRST })
      .onConflictDoUpdate({
        target: [companyCounters.companyId, companyCounters.name],
        set: { last: sql`${companyCounters.last} + 1` },
      })
      .returning({ last: companyCounters.last });
    if (!row) throw new Error(`No number was given for ${name}.`);
    return row.last;
  }
}
