import type { EstimateWithLimits } from '../fit/index.js';
import {
  givenNames,
  lengthLikeNames,
  type ReaderUnits,
  type Results,
  readerUnits,
  textInUnits,
} from '../study/index.js';
import { crewMask } from './crewNames.js';
import { formatNumber, NOT_GIVEN, type NumberKind } from './format.js';
import { type Html, html } from './html.js';

/**
 * Writes what results hold onto pages: numbers in the units of the reader, each with the place in `results.json` from
 * which it comes, and names and sentences with crews numbered unless the study shows them.
 */
export class Page {
  readonly units: ReaderUnits;
  /** Names that look like lengths and are none. */
  readonly names: readonly string[];
  readonly #masked: (sentence: string) => string;
  readonly #places = new Map<object, string>();

  /** @param written what is written beside the page, in which every number has its place; default the results */
  constructor(
    readonly results: Results,
    written: object = results,
  ) {
    this.units = readerUnits(results.study.reportUnits);
    this.names = lengthLikeNames(results);
    this.#masked = results.study.showCrews
      ? (sentence) => sentence
      : crewMask(results.crews, givenNames(results));
    this.#place(written, '');
  }

  /**
   * A number of an object of the results.
   * @throws Error when the object is no part of the results: a number without a source is not printed
   */
  number<T extends object>(owner: T, key: keyof T & (string | number), kind: NumberKind): Html {
    const value = owner[key] as number | null;
    if (value === null) return html`${NOT_GIVEN}`;
    const place = `${this.#placeOf(owner)}/${String(key).replaceAll('~', '~0').replaceAll('/', '~1')}`;
    return html`<data value="${value}" data-at="${place}" data-kind="${kind}">${formatNumber(value, kind, this.units)}</data>`;
  }

  /** Sum of the numbers of an object, such as all rows set aside. */
  sum(owner: Readonly<Record<string, number>>): Html {
    const value = Object.values(owner).reduce((a, b) => a + b, 0);
    return html`<data value="${value}" data-sum="${this.#placeOf(owner)}" data-kind="count">${formatNumber(value, 'count', this.units)}</data>`;
  }

  /** Length of a list of the results. */
  length(list: readonly unknown[]): Html {
    return html`<data value="${list.length}" data-length="${this.#placeOf(list)}" data-kind="count">${formatNumber(list.length, 'count', this.units)}</data>`;
  }

  /** `1 day`, `30 days`. */
  counted<T extends object>(owner: T, key: keyof T & string, one: string, many = `${one}s`): Html {
    return html`${this.number(owner, key, 'count')} ${owner[key] === 1 ? one : many}`;
  }

  /** `1 mark`, `14 marks`: as many as a list has. */
  lengthOf(list: readonly unknown[], one: string, many = `${one}s`): Html {
    return html`${this.length(list)} ${list.length === 1 ? one : many}`;
  }

  /** `8.1 (7.6 to 8.6)`, or what of it can be given. */
  limits(owner: EstimateWithLimits, kind: NumberKind): Html {
    const at = (key: keyof EstimateWithLimits): Html => this.number(owner, key, kind);
    const { estimate, low, high } = owner;
    if (estimate === null && high === null) return html`${NOT_GIVEN}`;
    if (estimate === null) return html`below ${at('high')}`;
    if (low === null || high === null) return at('estimate');
    return html`${at('estimate')} (${at('low')} to ${at('high')})`;
  }

  /** A value of a table that is written beside the pages. */
  cell(table: string, row: number, column: string, value: number | null, kind: NumberKind): Html {
    if (value === null || Number.isNaN(value)) return html`${NOT_GIVEN}`;
    return html`<data value="${value}" data-table="${table}/${row}/${column}" data-kind="${kind}">${formatNumber(value, kind, this.units)}</data>`;
  }

  /** A sentence of the results in the units of the reader, without the names of crews. */
  text(sentence: string): string {
    return textInUnits(this.#masked(sentence), this.units, this.names);
  }

  /** The name of a crew, or its number. */
  crew(name: string): string {
    const { study, crews } = this.results;
    if (name === '' || study.showCrews) return name;
    const at = crews.indexOf(name);
    // Classes of occupations of which no crew is known have a name of their own.
    return at < 0 ? name : `crew ${at + 1}`;
  }

  /** A name from a log or study file, whose letters may run from right to left. */
  name(text: string): Html {
    return html`<bdi>${text}</bdi>`;
  }

  #placeOf(owner: object): string {
    const place = this.#places.get(owner);
    if (place === undefined) throw new Error('A number on a page must come from the results.');
    return place;
  }

  #place(value: unknown, place: string): void {
    if (value === null || typeof value !== 'object') return;
    if (!this.#places.has(value)) this.#places.set(value, place);
    for (const [key, part] of Object.entries(value)) {
      this.#place(part, `${place}/${key.replaceAll('~', '~0').replaceAll('/', '~1')}`);
    }
  }
}
