import type { StageAmount } from '@lampwright/geometry/price';
import { Injectable } from '@nestjs/common';
import { AppError } from '../../http/app-error.js';
import type { SharedPage } from '../share/share.dto.js';

export interface ApprovedPrice {
  readonly companyId: string;
  readonly proposalId: string;
  readonly approvalId: string;
  readonly currency: string;
  readonly totalMinor: number;
  /** Of the approved combination; they add up to the total. */
  readonly stages: readonly StageAmount[];
  /** What was agreed before, where this approves a change order; null for the first approval. */
  readonly before: { readonly totalMinor: number; readonly revision: number } | null;
  readonly revision: number;
}

const notBuilt = () => new AppError(501, 'not-built', 'This is not built yet.');

/** What homeowners owe, stage by stage. */
@Injectable()
export class Dues {
  /** Makes the dues of an approval, within its transaction; the one due at approval is asked for at once. */
  async openFor(_approved: ApprovedPrice): Promise<void> {
    throw notBuilt();
  }

  /** As the homeowner sees them. */
  async shared(_companyId: string, _proposalId: string): Promise<SharedPage['dues']> {
    throw notBuilt();
  }

  /** Invoices, receipts and notes of refunds that the homeowner may open: `money-<id>`. */
  async papers(_companyId: string, _proposalId: string): Promise<SharedPage['papers']> {
    throw notBuilt();
  }

  /** Begins a payment by card, or goes on with one that is open. */
  async checkout(
    _guest: { readonly companyId: string; readonly proposalId: string; readonly email: string },
    _dueId: string,
    _returnUrl: string,
  ): Promise<{ readonly url: string }> {
    throw notBuilt();
  }
}
