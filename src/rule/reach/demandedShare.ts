import { type WrongFixGrowth, wrongFixShareAtKm } from '../../fit/index.js';

/** Shares are computed on this grid of lengths once and interpolated between. */
const STEP_KM = 0.1;

/** Share of wrong fixes at a length: what a rule reckons with, and the mean. */
export interface WrongFixShares {
  /** 80 % quantile of the posterior. */
  readonly reckoned: (km: number) => number;
  readonly mean: (km: number) => number;
}

/** Shares by step of length, for as long as their growth is in use. */
const computed = new WeakMap<WrongFixGrowth, Map<number, { mean: number; high80: number }>>();

/** Remembers what it computed: a quantile of the posterior is a sort, and a table of rules asks for thousands. */
export function wrongFixShares(growth: WrongFixGrowth | null): WrongFixShares {
  if (growth === null) return { reckoned: () => 0, mean: () => 0 };
  const known = computed.get(growth) ?? new Map<number, { mean: number; high80: number }>();
  computed.set(growth, known);
  const at = (step: number) => {
    let share = known.get(step);
    if (share === undefined) {
      share = wrongFixShareAtKm(growth, step * STEP_KM);
      known.set(step, share);
    }
    return share;
  };
  const between = (km: number, of: (share: { mean: number; high80: number }) => number): number => {
    const place = Math.max(1, km / STEP_KM);
    const nearest = Math.round(place);
    if (Math.abs(place - nearest) < 1e-9) return of(at(nearest));
    const below = Math.floor(place);
    return of(at(below)) + (place - below) * (of(at(below + 1)) - of(at(below)));
  };
  return {
    reckoned: (km) => between(km, ({ high80 }) => high80),
    mean: (km) => between(km, ({ mean }) => mean),
  };
}

/**
 * Share of the right fixes that must hold a limit so that a share of all positions does, wrong fixes counted as
 * failures: p/(1 - ε). From 1 on nothing can hold it.
 */
export const demandedShare = (share: number, wrongFixShare: number): number => share / (1 - wrongFixShare);
