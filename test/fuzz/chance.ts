/** A whole number from 0 to below `limit`. */
export const uniformInt = (random: () => number, limit: number): number => Math.floor(random() * limit);
