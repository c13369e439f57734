import { setImmediate } from 'node:timers/promises';
import type { PlanFault } from '@lampwright/geometry/estimate';
import { type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
import { combinationsOf, type JobPricing, planWith } from '@lampwright/geometry/price';
import type { UnitSystem } from '@lampwright/geometry/units';
import { Injectable } from '@nestjs/common';
import type { PlanAt } from '../plans/plan-documents.js';
import type { PlanKey } from '../plans/plans.repository.js';
import { type SolvedPlan, solvePlan } from '../plans/solve-plan.js';
import { seriousOf } from './fault-keys.js';

/** What the solver says of one combination of groups, whoever accepted what. */
export interface JudgedCombination {
  readonly groups: readonly string[];
  readonly faults: readonly PlanFault[];
  /** Why there is no answer, or nothing to offer; null where there is neither. */
  readonly refusal: string | null;
}

export interface JudgedPlan {
  /** Of severity "fault", of the whole plan. */
  readonly faults: readonly PlanFault[];
  readonly failure: string | null;
  /** Cables whose length is not known. */
  readonly waiting: readonly string[];
  readonly volts: ReadonlyMap<string, number>;
  /** The offered one first. */
  readonly combinations: readonly JudgedCombination[];
}

type Grouping = Pick<JobPricing, 'groups' | 'members'>;

interface Remembered {
  readonly of: string;
  readonly judged: Promise<JudgedPlan>;
}

/** Plans whose judgement is kept: it depends on nothing but the plan's version, the groups and the units. */
const PLANS_REMEMBERED = 32;

/**
 * Solves a plan, and what is left of it with each combination of its groups: up to 64 solutions. Others are let
 * to the processor between two of them, and the same question is not worked out twice.
 */
@Injectable()
export class PlanJudge {
  private readonly remembered = new Map<string, Remembered>();

  async judge(
    { companyId, jobId }: PlanKey,
    { version, plan }: PlanAt,
    grouping: Grouping,
    system: UnitSystem,
  ): Promise<JudgedPlan> {
    const name = `${companyId}/${jobId}`;
    const groups = grouping.groups.map(({ id, on }) => [id, on]);
    const of = JSON.stringify([version, system, groups, grouping.members]);
    const known = this.remembered.get(name);
    // Taking it out first makes the order of the map that of use.
    this.remembered.delete(name);
    if (known?.of === of) {
      this.remembered.set(name, known);
      return known.judged;
    }
    const entry = { of, judged: judgePlan(plan, grouping, system) };
    this.remembered.set(name, entry);
    for (const oldest of this.remembered.keys()) {
      if (this.remembered.size <= PLANS_REMEMBERED) break;
      this.remembered.delete(oldest);
    }
    try {
      return await entry.judged;
    } catch (error) {
      if (this.remembered.get(name) === entry) this.remembered.delete(name);
      throw error;
    }
  }
}

async function judgePlan(plan: PlanDocument, grouping: Grouping, system: UnitSystem): Promise<JudgedPlan> {
  const { faults, failure, estimate, answer } = solvePlan(plan, system);
  const combinations: JudgedCombination[] = [];
  for (const groups of combinationsOf(grouping)) {
    await setImmediate();
    const reduced = planWith(plan, grouping, new Set(groups));
    const solved = solvePlan(reduced, system);
    combinations.push({ groups, faults: seriousOf(solved.faults), refusal: refusalOf(reduced, solved) });
  }
  return {
    faults: seriousOf(faults),
    failure,
    waiting: estimate.waiting,
    volts: new Map((answer?.fixtures ?? []).map(({ id, volts }) => [id, volts])),
    combinations,
  };
}

function refusalOf(plan: PlanDocument, { failure }: SolvedPlan): string | null {
  if (failure !== null) return failure;
  return recordsOf(plan, 'fixture').next().done ? 'There is no light in it.' : null;
}
