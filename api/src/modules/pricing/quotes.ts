import type { PlanDocument } from '@lampwright/geometry/plan';
import type { JobPricing, PriceBook, Quote } from '@lampwright/geometry/price';
import { Injectable } from '@nestjs/common';
import { AppError } from '../../http/app-error.js';
import type { CombinationCheck, Obstacle, QuoteAnswer } from './pricing.dto.js';

/** The price of a job as it is now, with all that the company itself may know. */
export interface WorkedQuote {
  readonly plan: PlanDocument;
  readonly planVersion: number;
  readonly pricing: JobPricing;
  readonly pricingVersion: number;
  readonly book: PriceBook;
  /** With costs. */
  readonly quote: Quote;
  readonly faults: QuoteAnswer['faults'];
  readonly checks: readonly CombinationCheck[];
  readonly obstacles: readonly Obstacle[];
  /** Volts of each fixture in the whole plan, by record; none where there is no answer. */
  readonly volts: ReadonlyMap<string, number>;
}

/** Works out the price of a job from its plan, the company's prices and what people decided. */
@Injectable()
export class Quotes {
  /** Null where the job is not the company's. */
  async work(_companyId: string, _jobId: string): Promise<WorkedQuote | null> {
    throw new AppError(501, 'not-built', 'This is not built yet.');
  }
}
