/** Throws the RangeError of this folder's wording: which argument, what was expected, what came. */
export function requireRange(ok: boolean, argument: string, expected: string, received: unknown): void {
  if (!ok) throw new RangeError(`${argument}: expected ${expected}, received ${String(received)}`);
}

/** Holds a probability to the open interval (0, 1); a quantile at 0 or 1 is no finite number in general. */
export function requireProbability(p: number): void {
  requireRange(p > 0 && p < 1, 'p', 'a probability greater than 0 and less than 1', p);
}

/** Holds a degrees-of-freedom or shape argument to finite positive numbers. */
export function requirePositive(argument: string, value: number): void {
  requireRange(
    value > 0 && value < Number.POSITIVE_INFINITY,
    argument,
    'a finite number greater than 0',
    value,
  );
}
