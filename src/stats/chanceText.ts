/** A p-value in a sentence: `p = 0.032`; below one in a thousand `p < 0.001`, for a chance is never 0. */
export const chanceText = (p: number): string => (p < 0.001 ? 'p < 0.001' : `p = ${p.toFixed(3)}`);
