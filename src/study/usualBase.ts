import type { OccupationError } from '../errors/index.js';

/** The base of most occupations, the first by name among equals; null without any. */
export function usualBase(errors: readonly OccupationError[]): string | null {
  const counts = new Map<string, number>();
  for (const { base } of errors) counts.set(base, (counts.get(base) ?? 0) + 1);
  const [first] = [...counts].sort(([a, m], [b, n]) => n - m || (a < b ? -1 : 1));
  return first?.[0] ?? null;
}
