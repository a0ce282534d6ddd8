import { daysNeeded, runLengths } from './calendar.js';
import { refuse, unknownKey } from './checks.js';
import { CAMPAIGN_DEFAULTS, MARK_GENERATOR_DEFAULTS, SWITCHED_ON_DEFAULTS } from './defaults.js';
import { OPTION_CHECKS } from './optionChecks.js';
import type { CampaignOptions, CampaignSettings } from './options.js';

/**
 * Fills in the defaults and checks everything before anything is drawn.
 * Throws a `RangeError` naming the option, what it must be and what it was, also for unknown keys.
 */
export function resolveOptions(options: CampaignOptions): CampaignSettings {
  for (const key of Object.keys(options))
    if (!Object.hasOwn(OPTION_CHECKS, key)) unknownKey(key, Object.keys(OPTION_CHECKS));
  const settings = Object.fromEntries(
    Object.keys(OPTION_CHECKS).map((key) => [key, filledIn(key as keyof CampaignSettings, options)]),
  ) as unknown as CampaignSettings;
  for (const [key, check] of Object.entries(OPTION_CHECKS))
    check(settings[key as keyof CampaignSettings], key);
  checkTogether(settings);
  return settings;
}

/** The given value, or the default; of a nested object the given keys over the default's. */
function filledIn(key: keyof CampaignSettings, options: CampaignOptions): unknown {
  const given: unknown = options[key];
  if (given === undefined) return CAMPAIGN_DEFAULTS[key];
  if (typeof given !== 'object' || given === null || Array.isArray(given)) return given;
  const inner: unknown =
    key === 'marks'
      ? MARK_GENERATOR_DEFAULTS
      : key === 'otherBase'
        ? { mounting: 'tripod', setupsPerDay: 1 }
        : (CAMPAIGN_DEFAULTS[key] ?? SWITCHED_ON_DEFAULTS[key as keyof typeof SWITCHED_ON_DEFAULTS]);
  return { ...(inner as object), ...given };
}

function checkTogether(settings: CampaignSettings): void {
  const { workHours, crews, rovers, badDays, days, wrongFixes, marks, base, otherBase } = settings;
  if (workHours.from === workHours.to) refuse('workHours', '"from" before "to"', workHours);
  if (rovers.length < crews.length)
    refuse('rovers', `at least as many as crews (${crews.length})`, rovers.length);
  if (wrongFixes !== null && wrongFixes.shortestMm > wrongFixes.longestMm)
    refuse('wrongFixes', '"shortestMm" not above "longestMm"', wrongFixes);
  if (!('length' in marks) && (marks.nearestKm > marks.farthestKm || marks.lowestM > marks.highestM))
    refuse('marks', '"nearestKm" not above "farthestKm" and "lowestM" not above "highestM"', marks);
  if (otherBase !== null) {
    if (otherBase.name === base.name)
      refuse('otherBase.name', "a name other than the first base's", base.name);
    if (otherBase.fromDay > otherBase.toDay || otherBase.toDay > days)
      refuse('otherBase', `"fromDay" not after "toDay", and both among the ${days} days`, {
        fromDay: otherBase.fromDay,
        toDay: otherBase.toDay,
      });
  }
  const needed = badDays === null ? 0 : daysNeeded(runLengths(badDays));
  if (badDays !== null && needed > days)
    refuse(
      'badDays',
      `runs that fit into ${days} days with an ordinary day between two (they need ${needed})`,
      {
        runs: badDays.runs,
        runLength: badDays.runLength,
        singles: badDays.singles,
      },
    );
}
