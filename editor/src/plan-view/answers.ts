import type {
  CableAnswer,
  CommonAnswer,
  EstimateAnswer,
  EstimateWarning,
  FixtureAnswer,
  RunAnswer,
  TransformerAnswer,
} from '@lampwright/geometry/estimate';

/** An estimate's answer, found by id. */
export interface Answers {
  readonly fixtures: ReadonlyMap<string, FixtureAnswer>;
  readonly cables: ReadonlyMap<string, CableAnswer>;
  readonly runs: ReadonlyMap<string, RunAnswer>;
  readonly transformers: ReadonlyMap<string, TransformerAnswer>;
  readonly warnings: readonly EstimateWarning[];
  common(transformerId: string, id: string): CommonAnswer | undefined;
}

export function indexAnswer(answer: EstimateAnswer): Answers {
  const commons = new Map(answer.commons.map((c) => [JSON.stringify([c.transformerId, c.id]), c]));
  return {
    fixtures: byId(answer.fixtures),
    cables: byId(answer.cables),
    runs: byId(answer.runs),
    transformers: byId(answer.transformers),
    warnings: answer.warnings,
    common: (transformerId, id) => commons.get(JSON.stringify([transformerId, id])),
  };
}

function byId<T extends { id: string }>(list: readonly T[]): Map<string, T> {
  return new Map(list.map((x) => [x.id, x]));
}
