/** The equations have no answer that could be found and verified; the sentence is for the person who asked. */
export class NoConvergence extends Error {
  readonly code = 'no-convergence';

  constructor(
    readonly runIds: readonly string[],
    sentence: string,
  ) {
    super(sentence);
    this.name = 'NoConvergence';
  }
}
