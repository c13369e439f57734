import { normalizeEstimateRequest, parseEstimateRequest } from '@lampwright/geometry/estimate';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { NoConvergence, solveEstimate } from '../../circuit/index.js';
import { AppError, badInput } from '../../http/app-error.js';
import { RequestBudget } from './request-budget.js';

/** The answer as JSON text, and how many milliseconds each part took. */
export interface TimedEstimate {
  readonly json: string;
  readonly milliseconds: { readonly validate: number; readonly solve: number; readonly write: number };
}

@Injectable()
export class EstimatesService {
  constructor(@Inject(RequestBudget) private readonly budget: RequestBudget) {}

  /**
   * @throws AppError 400 with a pointer to every fault, 422 when no answer could be found and verified, 429 when
   * the person asks too often
   */
  estimate(actor: Actor, body: unknown): TimedEstimate {
    demand(actor, 'estimates.run');
    this.budget.spend(actor.userId);
    const started = performance.now();
    const parsed = parseEstimateRequest(body);
    if (!parsed.ok) throw badInput(parsed.errors, 'The estimate cannot be worked out from this request.');
    const validated = performance.now();
    try {
      const answer = solveEstimate(normalizeEstimateRequest(parsed.request));
      const solved = performance.now();
      const json = JSON.stringify(answer);
      const written = performance.now();
      return {
        json,
        milliseconds: {
          validate: validated - started,
          solve: solved - validated,
          write: written - solved,
        },
      };
    } catch (error) {
      if (!(error instanceof NoConvergence)) throw error;
      throw new AppError(422, error.code, error.message, { runIds: error.runIds });
    }
  }
}
