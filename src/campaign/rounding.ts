/** A number as it reads when written with so many decimals. */
export function roundTo(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
