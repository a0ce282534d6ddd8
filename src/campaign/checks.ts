/** Checks one option's value; throws a `RangeError` that says where, what was expected and what came. */
export type Check = (value: unknown, path: string) => void;

const received = (value: unknown): string =>
  typeof value === 'number' ? String(value) : (JSON.stringify(value) ?? String(value));

/** Throws the message all campaign options share: the option, what it must be, what it was. */
export function refuse(path: string, expected: string, value: unknown): never {
  throw new RangeError(`campaign option "${path}": expected ${expected}, received ${received(value)}`);
}

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** A finite number between two limits, both included. */
export function numberFrom(low: number, high = Number.POSITIVE_INFINITY): Check {
  const expected =
    high === Number.POSITIVE_INFINITY ? `a number of at least ${low}` : `a number from ${low} to ${high}`;
  return (value, path) => {
    if (typeof value !== 'number' || !Number.isFinite(value) || value < low || value > high)
      refuse(path, expected, value);
  };
}

/** A whole number between two limits, both included. */
export function wholeNumberFrom(low: number, high: number): Check {
  return (value, path) => {
    if (!Number.isSafeInteger(value) || (value as number) < low || (value as number) > high)
      refuse(path, `a whole number from ${low} to ${high}`, value);
  };
}

/** One of some words. */
export function oneOf(...words: readonly (string | boolean)[]): Check {
  return (value, path) => {
    if (!words.some((word) => word === value))
      refuse(path, words.map((w) => received(w)).join(' or '), value);
  };
}

/** A text that has a visible character and nothing that would break a line of a comma-separated file. */
export const plainText: Check = (value, path) => {
  if (typeof value !== 'string' || value.trim() === '' || value !== value.trim() || /[",;\r\n]/.test(value))
    refuse(path, 'a text without commas, semicolons, quotes, line breaks or blanks around it', value);
};

/** A date `YYYY-MM-DD` that the calendar has. */
export const isoDate: Check = (value, path) => {
  const well = typeof value === 'string' && /^\d{4}-\d\d-\d\d$/.test(value);
  const ms = well ? Date.parse(`${value}T00:00:00Z`) : Number.NaN;
  if (Number.isNaN(ms) || new Date(ms).toISOString().slice(0, 10) !== value)
    refuse(path, 'a date written YYYY-MM-DD', value);
};

/** An object with exactly these keys. */
export function objectOf(checks: Readonly<Record<string, Check>>): Check {
  return (value, path) => {
    if (!isObject(value)) refuse(path, `an object with ${Object.keys(checks).join(', ')}`, value);
    for (const key of Object.keys(value))
      if (!Object.hasOwn(checks, key)) unknownKey(`${path}.${key}`, Object.keys(checks));
    for (const [key, check] of Object.entries(checks)) check(value[key], `${path}.${key}`);
  };
}

/** Throws for a key that is no option, naming those there are. */
export function unknownKey(path: string, known: readonly string[]): never {
  throw new RangeError(`campaign option "${path}": there is no such option; there are ${known.join(', ')}`);
}

/** East, north and up, each at least `low`. */
export const axesFrom = (low: number): Check =>
  objectOf({ east: numberFrom(low), north: numberFrom(low), up: numberFrom(low) });

/** `{from, to}` with both ends passing `end` and `from` not above `to`. */
export function rangeOf(end: Check): Check {
  const ends = objectOf({ from: end, to: end });
  return (value, path) => {
    ends(value, path);
    const { from, to } = value as { from: number; to: number };
    if (from > to) refuse(path, '"from" not above "to"', value);
  };
}

/** Null, or what `check` accepts. */
export const nullOr =
  (check: Check): Check =>
  (value, path) => {
    if (value !== null) check(value, path);
  };

/** A list that is not empty, every element of which passes `check`, no two with the same `name`. */
export function listOf(check: Check, name: (element: never) => unknown): Check {
  return (value, path) => {
    if (!Array.isArray(value) || value.length === 0) refuse(path, 'a list of at least one', value);
    const elements: unknown[] = value;
    for (const [i, element] of elements.entries()) check(element, `${path}[${i}]`);
    const names = elements.map((element) => name(element as never));
    const repeated = names.find((n, i) => names.indexOf(n) !== i);
    if (repeated !== undefined) refuse(path, 'names that differ', repeated);
  };
}
