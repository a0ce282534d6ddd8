/** Contrast ratio of a colour such as `#22303c` with white (WCAG 2.1, relative luminance). */
export function contrastOnWhite(color: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const share = Number.parseInt(color.slice(at, at + 2), 16) / 255;
    return share <= 0.03928 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 1.05 / (0.2126 * r + 0.7152 * g + 0.0722 * b + 0.05);
}
