import { hasDecimalComma, hasDecimalPoint, hasThousandsMarks } from './cellKinds.js';
import type { Doubt } from './recognition.js';
import type { Sheet } from './sheet.js';

/** The decimal mark of a sheet, and whether both marks are used so often that neither can be meant. */
export interface DecimalMark {
  readonly decimal: '.' | ',';
  readonly doubt: Doubt | null;
}

/** One mark is meant when it stands in so many times the numbers that the other stands in. */
const CLEAR = 10;

export function decimalMark({ rows }: Sheet): DecimalMark {
  const cells = rows.flatMap((row) => row.cells);
  const commas = cells.filter(hasDecimalComma).length;
  const points = cells.filter(hasDecimalPoint).length;
  const decimal = commas > points ? ',' : '.';
  const clear = Math.max(commas, points) > CLEAR * Math.min(commas, points);
  if (clear || commas + points === 0) return { decimal, doubt: null };
  return {
    decimal,
    doubt: {
      code: 'decimal-mark',
      question: 'Is the decimal mark of this file a comma or a point?',
      because: `Some cells are written with a comma like "${cells.find(hasDecimalComma)}", others with a point like "${cells.find(hasDecimalPoint)}".`,
      key: 'layout.decimal',
      choices: ['point', 'comma'],
      decisive: true,
    },
  };
}

/** A number with marks between its thousands, where such numbers stand in half of the rows or more; else null. */
export function thousandsExample({ rows }: Sheet): string | null {
  const found = rows.flatMap(({ cells }) => cells.find(hasThousandsMarks) ?? []);
  return found.length > 0 && 2 * found.length >= rows.length ? found[0]! : null;
}

/**
 * Whether decimal commas were written between commas as well (`1,500,25,600,5`): every cell below the header is a
 * whole number, there are more of them than names, and each name but the first few has two.
 */
export function commasCutNumbers({ header, cut, rows }: Sheet): boolean {
  if (header === null || cut.name !== 'comma' || cut.width <= header.cells.length) return false;
  const cells = rows.flatMap((row) => row.cells).filter((cell) => /\d/.test(cell));
  const whole = cells.filter((cell) => /^[-+]?\d+$/.test(cell)).length;
  return cut.width <= 2 * header.cells.length && whole > 0.8 * cells.length;
}
