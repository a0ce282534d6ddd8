import type { OccupationError, SetAsideOccupation } from '../errors/index.js';
import { type Message, message } from '../logs/index.js';
import type { Study } from './study.js';

/** Errors that are used, those that are not, and what is to be told of these. */
export interface DividedErrors {
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly messages: readonly Message[];
}

/** Sets aside the occupations of the days that the study file names, and says so. */
export function leaveOutDays(
  computed: Omit<DividedErrors, 'messages'>,
  { leaveOutDays: days }: Pick<Study, 'leaveOutDays'>,
): DividedErrors {
  if (days.length === 0) return { ...computed, messages: [] };
  const left = new Set(days);
  const errors: OccupationError[] = [];
  const setAside: SetAsideOccupation[] = [...computed.setAside];
  for (const error of computed.errors) {
    if (left.has(error.day)) setAside.push({ reason: 'left-out-day', detail: '', error });
    else errors.push(error);
  }
  const found = new Set(computed.errors.map(({ day }) => day));
  const messages: Message[] = days.map((day) =>
    found.has(day)
      ? message(
          'warning',
          'left-out-day',
          `Day ${day} is left out as the study file asks. Say why in the report.`,
        )
      : message(
          'warning',
          'left-out-day',
          `Day ${day} is to be left out and has no occupations. Check the date in leaveOutDays.`,
        ),
  );
  return { errors, setAside, messages };
}
