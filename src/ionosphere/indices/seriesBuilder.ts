import {
  INDEX_LENGTH_MS,
  INDEX_NAMES,
  INDEX_STATUSES,
  type IndexName,
  type IndexSeries,
  type IndexStatus,
} from './indexSeries.js';

/** An interval for which two different values were given, by name and start. */
export interface Conflict {
  readonly name: IndexName;
  readonly startMs: number;
  readonly kept: number;
  readonly dropped: number;
}

export interface BuiltSeries {
  readonly series: Partial<Record<IndexName, IndexSeries>>;
  readonly conflicts: readonly Conflict[];
}

interface Column {
  readonly startMs: number[];
  readonly values: number[];
  readonly status: number[];
}

/**
 * Gathers values in any order into series. Of two values for one interval the more final one is kept, of two that are
 * equally final the one added last; a value is better than a missing mark.
 */
export class SeriesBuilder {
  readonly #columns = new Map<IndexName, Column>();

  add(name: IndexName, startMs: number, value: number, status: IndexStatus): void {
    let column = this.#columns.get(name);
    if (column === undefined) {
      column = { startMs: [], values: [], status: [] };
      this.#columns.set(name, column);
    }
    column.startMs.push(startMs);
    column.values.push(value);
    column.status.push(INDEX_STATUSES.indexOf(status));
  }

  build(): BuiltSeries {
    const conflicts: Conflict[] = [];
    const series: Partial<Record<IndexName, IndexSeries>> = {};
    for (const name of INDEX_NAMES) {
      const column = this.#columns.get(name);
      // a column of missing marks alone is no series: the daily file has one for what it does not hold
      if (column?.values.some((value) => !Number.isNaN(value)))
        series[name] = seriesOf(name, column, conflicts);
    }
    return { series, conflicts };
  }
}

function seriesOf(name: IndexName, column: Column, conflicts: Conflict[]): IndexSeries {
  const { startMs, values, status } = column;
  const order = startMs.map((_, i) => i);
  // sorting is stable: of equal starts the one added last comes last
  if (startMs.some((ms, i) => ms < startMs[i - 1]!)) order.sort((a, b) => startMs[a]! - startMs[b]!);
  const kept: number[] = [];
  for (const entry of order) {
    const before = kept.at(-1);
    if (before === undefined || startMs[before] !== startMs[entry]) {
      kept.push(entry);
      continue;
    }
    const [winner, loser] = isBetter(entry, before, column) ? [entry, before] : [before, entry];
    kept[kept.length - 1] = winner;
    const [keptValue, dropped] = [values[winner]!, values[loser]!];
    if (!Number.isNaN(dropped) && dropped !== keptValue)
      conflicts.push({ name, startMs: startMs[entry]!, kept: keptValue, dropped });
  }
  return {
    startMs: Float64Array.from(kept, (entry) => startMs[entry]!),
    lengthMs: INDEX_LENGTH_MS[name],
    values: Float64Array.from(kept, (entry) => values[entry]!),
    status: Uint8Array.from(kept, (entry) => status[entry]!),
  };
}

/** Whether a later entry takes the place of an earlier one. */
function isBetter(later: number, earlier: number, { values, status }: Column): boolean {
  const [isLater, isEarlier] = [later, earlier].map((entry) => !Number.isNaN(values[entry]!));
  if (isLater !== isEarlier) return isLater!;
  return status[later]! >= status[earlier]!;
}
