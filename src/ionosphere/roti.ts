/** ROTI of one window. */
export interface Roti {
  /** UTC milliseconds; rates stamped after the start and up to the end count. */
  readonly startMs: number;
  readonly endMs: number;
  /** Standard deviation of the rates, TECU per minute, dividing by their number. */
  readonly roti: number;
  readonly rates: number;
}

export interface RotiOptions {
  /** Time between values, s; default 30. Longer steps are gaps and give no rate. */
  readonly stepSeconds?: number | undefined;
  /** Length of a window, s; default 300. */
  readonly windowSeconds?: number | undefined;
  /** Beginning of the first window; default the first time. */
  readonly originMs?: number | undefined;
}

const MINUTE_MS = 60_000;

/**
 * Rate-of-TEC index (Pi et al. 1997, GRL 24): √(⟨ROT²⟩ − ⟨ROT⟩²) over windows, ROT the change of slant TEC of one
 * satellite per minute, stamped at the later of its two times. The unknown bias of phase TEC drops out. Values hang on
 * step and window, and must not be compared across choices. Windows without two rates are left out.
 * @param timesMs ascending, one satellite's arc
 * @param slantTecu NaN is a gap
 * @throws RangeError when the lengths differ or a length of time is not positive
 */
export function rotiOf(
  timesMs: ArrayLike<number>,
  slantTecu: ArrayLike<number>,
  options: RotiOptions = {},
): Roti[] {
  const { stepSeconds = 30, windowSeconds = 300, originMs = timesMs[0] ?? 0 } = options;
  if (slantTecu.length !== timesMs.length)
    throw new RangeError(
      `slantTecu: expected ${timesMs.length} values as in timesMs, received ${slantTecu.length}`,
    );
  if (!(stepSeconds > 0 && windowSeconds > 0))
    throw new RangeError(
      `stepSeconds, windowSeconds: expected positive numbers, received ${stepSeconds}, ${windowSeconds}`,
    );
  const windowMs = 1000 * windowSeconds;
  const ratesByWindow = new Map<number, number[]>();
  for (let i = 1; i < timesMs.length; i++) {
    const stepMs = timesMs[i]! - timesMs[i - 1]!;
    const rate = ((slantTecu[i]! - slantTecu[i - 1]!) / stepMs) * MINUTE_MS;
    if (Math.abs(stepMs - 1000 * stepSeconds) > 1 || Number.isNaN(rate)) continue;
    const window = Math.ceil((timesMs[i]! - originMs) / windowMs) - 1;
    const rates = ratesByWindow.get(window);
    if (rates === undefined) ratesByWindow.set(window, [rate]);
    else rates.push(rate);
  }
  return [...ratesByWindow]
    .filter(([, rates]) => rates.length >= 2)
    .sort(([a], [b]) => a - b)
    .map(([window, rates]) => {
      const mean = rates.reduce((a, b) => a + b, 0) / rates.length;
      const square = rates.reduce((total, rate) => total + (rate - mean) ** 2, 0) / rates.length;
      const startMs = originMs + window * windowMs;
      return { startMs, endMs: startMs + windowMs, roti: Math.sqrt(square), rates: rates.length };
    });
}
