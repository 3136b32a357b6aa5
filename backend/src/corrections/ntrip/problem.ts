/** Something is wrong at the caster, or on the way to it. The message says what was seen. */
export class NtripProblem extends Error {
  constructor(
    message: string,
    /** What to try. */
    readonly toTry: string,
    options?: ErrorOptions,
  ) {
    super(message, options);
  }
}
