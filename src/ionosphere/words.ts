/** A count with its noun: `1 day`, `30 days`. */
export const counted = (count: number, noun: string): string => `${count} ${noun}${count === 1 ? '' : 's'}`;

/** An instant in a sentence, to the minute: `2024-05-10 18:00 UTC`. */
export const instantWords = (utcMs: number): string =>
  `${new Date(utcMs).toISOString().slice(0, 16).replace('T', ' ')} UTC`;

/** The UTC day of an instant: `2024-05-10`. */
export const dayWords = (utcMs: number): string => new Date(utcMs).toISOString().slice(0, 10);
