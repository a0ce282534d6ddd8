/** Coordinates that cannot be: what was expected and came, and which of the three is to blame. */
export class CoordinateFault extends RangeError {
  constructor(
    text: string,
    readonly index: 0 | 1 | 2,
  ) {
    super(text);
  }
}
