import type { EveningPlace } from '@lampwright/geometry/light';

/** A group of lights that the homeowner may take or leave. */
export interface OfferedGroup {
  readonly id: string;
  readonly name: string;
  /** Taken unless it is switched off. */
  readonly on: boolean;
}

/** What the night view has to be told of the job: where its evening is, and what is offered. */
export interface NightHere {
  readonly where: EveningPlace;
  /** Whose place the sunset is reckoned for; null: of none, so it is assumed. */
  readonly placeOf: 'property' | 'company' | null;
  /** Where the property's place is set; null for whoever may not. */
  readonly placeTo: string | null;
  readonly groups: readonly OfferedGroup[];
  /** Group by fixture; a fixture that is in none is always in. */
  readonly groupOf: ReadonlyMap<string, string>;
}
