import { Inject, Injectable } from '@nestjs/common';
import { and, desc, eq, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { jobEvents, jobs } from '../../database/schema/index.js';
import type { JobStage } from '../jobs/jobs.dto.js';

export type EventRow = typeof jobEvents.$inferSelect;

/** What a card of the board is made from. */
export interface BoardRow {
  readonly jobId: string;
  readonly name: string;
  readonly client: string;
  readonly stage: JobStage;
  readonly updatedAt: Date;
  readonly sheets: number;
  readonly fixtures: number | null;
  readonly faults: number | null;
  readonly proposalId: string | null;
  readonly openQuestions: number;
  readonly unanswered: number;
  readonly agreedMinor: number | null;
  readonly offeredMinor: number | null;
  readonly outstandingMinor: number;
  /** A due that the homeowner was asked for and has not paid. */
  readonly owedName: string | null;
  readonly released: boolean;
}

/** Cards a column; its count tells how many there are. */
export const CARDS_PER_STAGE = 50;

/** Faults told in summary `s` of job `j` that somebody answers for: by fault, and by the words that were read. */
const ACCEPTED = `SELECT count(*)::int
  FROM jsonb_array_elements(s.summary->'faults') told
  CROSS JOIN LATERAL (SELECT concat_ws(':', told->>'code', told->>'recordId', told->>'otherId') AS key) named
  WHERE told->>'severity' = 'fault' AND EXISTS (SELECT 1 FROM fault_acceptances f
    WHERE f.company_id = $1 AND f.job_id = j.id AND f.withdrawn_at IS NULL AND f.message = told->>'message'
      AND (f.fault_key = named.key OR starts_with(f.fault_key, named.key || ':')))`;

const OPEN_DUES = `
  SELECT d.company_id, d.proposal_id, d.name, d.position, d.requested_at, d.created_at,
    d.amount_minor - d.reduced_minor - coalesce((
      SELECT sum(p.amount_minor - coalesce((
        SELECT sum(r.amount_minor) FROM refunds r
        WHERE r.company_id = p.company_id AND r.payment_id = p.id AND r.status <> 'failed'), 0))
      FROM payments p
      WHERE p.company_id = d.company_id AND p.due_id = d.id AND p.status = 'succeeded'), 0) AS open_minor
  FROM dues d WHERE d.company_id = $1`;

@Injectable()
export class TimelineRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Null where the job is not the company's. */
  async job(companyId: string, jobId: string): Promise<{ createdAt: Date; name: string } | null> {
    const [row] = await this.database.queries
      .select({ createdAt: jobs.createdAt, name: jobs.name })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)));
    return row ?? null;
  }

  /** Newest first. */
  async events(companyId: string, jobId: string): Promise<EventRow[]> {
    return this.database.queries
      .select()
      .from(jobEvents)
      .where(and(eq(jobEvents.companyId, companyId), eq(jobEvents.jobId, jobId)))
      .orderBy(desc(jobEvents.createdAt), desc(jobEvents.id));
  }

  async countsByStage(companyId: string): Promise<Map<JobStage, number>> {
    const rows = await this.database.queries
      .select({ stage: jobs.stage, count: sql<number>`count(*)::int` })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), isNull(jobs.archivedAt)))
      .groupBy(jobs.stage);
    return new Map(rows.map(({ stage, count }) => [stage, count]));
  }

  /** The newest cards of each stage, with all that tells what is owed next: one statement for all of them. */
  async cards(companyId: string): Promise<BoardRow[]> {
    const { rows } = await this.database.executeSql(
      `WITH ranked AS (
         SELECT j.*, row_number() OVER (PARTITION BY j.stage ORDER BY j.updated_at DESC, j.id) AS place
         FROM jobs j WHERE j.company_id = $1 AND j.archived_at IS NULL
       ), open_dues AS (${OPEN_DUES})
       SELECT j.id AS "jobId", j.name, c.name AS client, j.stage, j.updated_at AS "updatedAt",
         (SELECT count(*)::int FROM sheets s WHERE s.company_id = $1 AND s.job_id = j.id
            AND s.archived_at IS NULL AND s.status = 'ready') AS sheets,
         summary.fixtures, summary.faults - summary.accepted AS faults, p.id AS "proposalId",
         (SELECT count(*)::int FROM questions q WHERE q.company_id = $1 AND q.proposal_id = p.id
            AND q.resolved_at IS NULL) AS "openQuestions",
         (SELECT count(*)::int FROM questions q WHERE q.company_id = $1 AND q.proposal_id = p.id
            AND q.resolved_at IS NULL AND (SELECT m.side FROM question_messages m
              WHERE m.company_id = $1 AND m.question_id = q.id
              ORDER BY m.created_at DESC, m.id DESC LIMIT 1) = 'homeowner') AS unanswered,
         (SELECT a.total_minor::float8 FROM approvals a WHERE a.company_id = $1 AND a.proposal_id = p.id
            ORDER BY a.approved_at DESC LIMIT 1) AS "agreedMinor",
         (SELECT r.total_minor::float8 FROM proposal_revisions r WHERE r.company_id = $1 AND r.proposal_id = p.id
            ORDER BY r.revision DESC LIMIT 1) AS "offeredMinor",
         coalesce((SELECT sum(greatest(o.open_minor, 0)) FROM open_dues o WHERE o.proposal_id = p.id), 0)::float8
           AS "outstandingMinor",
         (SELECT o.name FROM open_dues o WHERE o.proposal_id = p.id AND o.requested_at IS NOT NULL
            AND o.open_minor > 0 ORDER BY o.created_at, o.position LIMIT 1) AS "owedName",
         EXISTS (SELECT 1 FROM proposal_revisions r WHERE r.company_id = $1 AND r.proposal_id = p.id
            AND r.released_at IS NOT NULL) AS released
       FROM ranked j
       JOIN properties pr ON pr.company_id = $1 AND pr.id = j.property_id
       JOIN clients c ON c.company_id = $1 AND c.id = pr.client_id
       LEFT JOIN proposals p ON p.company_id = $1 AND p.job_id = j.id
       LEFT JOIN LATERAL (SELECT s.fixtures, s.faults, (${ACCEPTED}) AS accepted FROM plan_summaries s
         WHERE s.company_id = $1 AND s.job_id = j.id
         ORDER BY s.plan_version DESC, s.created_at DESC LIMIT 1) summary ON true
       WHERE j.place <= $2
       ORDER BY j.updated_at DESC, j.id`,
      [companyId, CARDS_PER_STAGE],
    );
    return rows as BoardRow[];
  }

  /** One row a proposal that was ever sent: when first, for how much, and what became of it. */
  async sentProposals(companyId: string): Promise<SentProposal[]> {
    const { rows } = await this.database.executeSql(
      `SELECT p.id, min(r.sent_at) AS "firstSentAt",
         (array_agg(r.total_minor ORDER BY r.revision DESC))[1]::float8 AS "offeredMinor",
         (SELECT min(a.approved_at) FROM approvals a WHERE a.company_id = $1 AND a.proposal_id = p.id)
           AS "approvedAt",
         (SELECT a.total_minor::float8 FROM approvals a WHERE a.company_id = $1 AND a.proposal_id = p.id
            ORDER BY a.approved_at DESC LIMIT 1) AS "agreedMinor",
         EXISTS (SELECT 1 FROM declines d WHERE d.company_id = $1
            AND d.revision_id = (array_agg(r.id ORDER BY r.revision DESC))[1]) AS declined
       FROM proposals p JOIN proposal_revisions r
         ON r.company_id = $1 AND r.proposal_id = p.id AND r.sent_at IS NOT NULL
       WHERE p.company_id = $1 GROUP BY p.id`,
      [companyId],
    );
    return rows as SentProposal[];
  }

  /** Over all time: agreed and not paid yet; received less what was given back. */
  async money(companyId: string): Promise<{ outstandingMinor: number; receivedMinor: number }> {
    const { rows } = await this.database.executeSql(
      `WITH open_dues AS (${OPEN_DUES})
       SELECT coalesce((SELECT sum(greatest(open_minor, 0)) FROM open_dues), 0)::float8 AS "outstandingMinor",
         (coalesce((SELECT sum(amount_minor) FROM payments WHERE company_id = $1 AND status = 'succeeded'), 0)
          - coalesce((SELECT sum(amount_minor) FROM refunds WHERE company_id = $1 AND status = 'succeeded'), 0)
         )::float8 AS "receivedMinor"`,
      [companyId],
    );
    return rows[0] as { outstandingMinor: number; receivedMinor: number };
  }
}

export interface SentProposal {
  readonly firstSentAt: Date;
  readonly offeredMinor: number;
  readonly approvedAt: Date | null;
  readonly agreedMinor: number | null;
  readonly declined: boolean;
}
