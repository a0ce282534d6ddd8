/** The part of a row that is needed to find others like it. */
interface Coded {
  readonly code: number;
}

/** Codes that may be meant by one that is not known: two digits exchanged first, one mistyped next, then the nearest numbers. */
export function likelyCodes<T extends Coded>(code: number, known: readonly T[], count = 3): readonly T[] {
  const digits = String(code);
  const slips = (other: number): number => {
    const text = String(other);
    if (text.length !== digits.length) return 2;
    const differing = [...digits].flatMap((digit, i) => (digit === text[i] ? [] : [i]));
    const [i = 0, j = 0] = differing;
    const exchanged = j === i + 1 && digits[i] === text[j] && digits[j] === text[i];
    if (differing.length === 2 && exchanged) return 0;
    return differing.length === 1 ? 1 : 2;
  };
  return known
    .map((row) => ({ row, slips: slips(row.code), away: Math.abs(row.code - code) }))
    .sort((a, b) => a.slips - b.slips || a.away - b.away || a.row.code - b.row.code)
    .slice(0, count)
    .map(({ row }) => row);
}
