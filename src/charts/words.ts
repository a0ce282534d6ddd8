/** Narrow no-break space between thousands. */
const THIN = '\u202f';

/** A whole number with thin spaces between thousands from 10 000 on. */
export function countWords(count: number): string {
  const digits = count.toFixed(0);
  return digits.length < 5 ? digits : digits.replace(/\B(?=(\d{3})+$)/g, THIN);
}

/** A count with its noun: `1 day`, `30 days`. */
export function counted(count: number, noun: string): string {
  return `${countWords(count)} ${noun}${count === 1 ? '' : 's'}`;
}

/** Up to one decimal, none when whole: `25`, `24.4`. */
export function shortNumber(value: number): string {
  return String(Number(value.toFixed(1)));
}

/** A length rounded down to 0.1 km, as a limit must be. */
export function kmRoundedDown(km: number): string {
  // 32.3 * 10 is a hair below 323
  return (Math.floor(km * 10 + 1e-9) / 10).toFixed(1);
}

/** A share as per cent: `95 %`. */
export function percentWords(share: number): string {
  return `${shortNumber(100 * share)} %`;
}

/** With a sign, a true minus: `+1.2`, `−0.4`, `0.0`. */
export function signedNumber(value: number, digits = 1): string {
  const text = Math.abs(value).toFixed(digits);
  if (Number(text) === 0) return text;
  return `${value < 0 ? '\u2212' : '+'}${text}`;
}

/** Lines of at most so many characters, broken at blanks; a longer word keeps its own line. */
export function wrapText(text: string, characters: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 1 + word.length <= characters) {
      lines[lines.length - 1] = `${last} ${word}`;
    } else lines.push(word);
  }
  return lines;
}

/** The smallest round number that is not below a positive value: two digits, the second one even. */
export function roundUp(value: number): number {
  const step = 10 ** Math.floor(Math.log10(value)) / 5;
  return Number((Math.ceil(value / step - 1e-9) * step).toPrecision(6));
}

/** `Horizontal` or `Vertical`, at the head of a title. */
export const componentTitle = (component: 'horizontal' | 'vertical'): string =>
  component === 'horizontal' ? 'Horizontal' : 'Vertical';

/** What an RMS of a component is called: never a bare "RMS". */
export const rmsWords = (component: 'horizontal' | 'vertical'): string =>
  component === 'horizontal' ? 'radial RMS' : 'vertical RMS';

/** `p = 0.03`, `p < 0.001`. */
export const pWords = (p: number): string =>
  p < 0.001 ? 'p\u00a0<\u00a00.001' : `p\u00a0=\u00a0${p < 0.1 ? Number(p.toPrecision(2)) : p.toFixed(2)}`;
