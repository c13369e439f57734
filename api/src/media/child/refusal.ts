/** A file that can't be used, with a sentence for the person who sent it. */
export class Refusal extends Error {
  constructor(
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}
