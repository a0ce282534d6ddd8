import {
  type DayExplanation,
  type DayModel,
  type DegradedEvent,
  dailyFactors,
  dayDependence,
  dayModel,
  judgeDegradedDays,
  moderatedDays,
  timeOfDay,
} from '../days/index.js';
import type { OccupationError, Visit } from '../errors/index.js';
import type { ErrorModel, EstimateWithLimits } from '../fit/index.js';
import { type Message, message, quoted } from '../logs/index.js';
import { randomStream } from '../stats/index.js';
import type { DayModelResult, DegradedDayResult } from './dayResultTypes.js';
import type { ComponentFits } from './fitComponents.js';
import type { Results } from './results.js';
import type { Study } from './study.js';

/** The day model of a fit, and what single days and hours are like under it. */
export interface JudgedDays {
  readonly component: ErrorModel['component'];
  readonly model: DayModel;
  readonly explanations: readonly DayExplanation[];
  readonly results: Pick<Results, 'dayModels' | 'dailyFactors' | 'degradedDays' | 'timeOfDay'>;
  readonly messages: readonly Message[];
}

/** The day model alone of a fit; none for a form that has no days. */
export function dayModelOfFit(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  basis: ErrorModel,
): Pick<JudgedDays, 'component' | 'model'>[] {
  if (basis.form !== 'root-sum-square') return [];
  return [{ component: basis.component, model: dayModel(errors, basis, weights ?? undefined) }];
}

/**
 * Judges days and hours by the fit behind the rules of each component. A fit in another form than root-sum-square has
 * no day model.
 */
export function judgeDays(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  visits: readonly Visit[],
  components: readonly ComponentFits[],
  { seed }: Pick<Study, 'seed'>,
): JudgedDays[] {
  return components.flatMap(({ component, basis }) => {
    if (basis.form !== 'root-sum-square') return [];
    const own = weights ?? undefined;
    const model = dayModel(errors, basis, own);
    const explanations = judgeDegradedDays(errors, model, { visits });
    const moderated = moderatedDays(errors, basis, own);
    const dependence = dayDependence(errors, basis, model.dayEstimates, own);
    const hours = timeOfDay(errors, basis, {
      random: randomStream(seed, `hours ${component}`),
      weights: own,
    });
    const second = new Map(moderated.map(({ day, degraded }) => [day, degraded]));
    const summary: DayModelResult = {
      component,
      medianDayPpm: model.medianDayPpm,
      longRunPpm: model.longRunPpm,
      spread: model.tau,
      effectiveShare: model.effectiveShare,
      events: model.events,
      lagOneCorrelation: dependence.lagOneCorrelation,
      clusteredBy: dependence.cluster,
    };
    return [
      {
        component,
        model,
        explanations,
        results: {
          dayModels: [summary],
          dailyFactors: dailyFactors(model).map((factor) => ({
            ...factor,
            secondOpinion: factor.degraded === null ? null : (second.get(factor.day) ?? null),
          })),
          degradedDays: explanations.map(degradedDay),
          timeOfDay: [{ component, pValue: hours.pValue, hours: hours.hours, harmonics: hours.harmonics }],
        },
        messages: [
          ...model.notes.filter(({ code }) => code !== 'degraded-days'),
          ...degradedMessage(component, model.events, explanations),
          // What speaks for and against each is in the report.
          ...explanations.map(({ note }) => ({ ...note, severity: 'info' as const })),
          ...dependence.notes,
          ...hours.notes,
        ].map((note) => ({
          ...note,
          text: `${component === 'horizontal' ? 'Horizontal' : 'Vertical'}: ${note.text}`,
        })),
      },
    ];
  });
}

/** All degraded days in one sentence, days in a row together, each with what it is put down to. */
export function degradedMessage(
  component: string,
  events: readonly DegradedEvent[],
  explanations: readonly Pick<DayExplanation, 'day' | 'factor' | 'verdict' | 'subject'>[],
): Message[] {
  if (explanations.length === 0) return [];
  const words = (day: string): string => {
    const { factor, verdict, subject } = explanations.find((each) => each.day === day)!;
    return `${factor.toFixed(1)} times, ${verdict}${subject === null ? '' : ` ${quoted(subject)}`}`;
  };
  const list = events
    .map(
      ({ days }) =>
        `${days.length === 1 ? days[0] : `${days.join(', ')} in a row`} (${days.map(words).join('; ')})`,
    )
    .join(', ');
  const count = explanations.length === 1 ? 'One day was' : `${explanations.length} days were`;
  const grouped =
    events.length < explanations.length
      ? `, which makes ${events.length === 1 ? 'one event' : `${events.length} events`}`
      : '';
  return [
    message(
      'warning',
      'degraded-days',
      `${count} worse than the median day in ${component} ppm${grouped}: ${list}. They stay in the fit; a day is left out only where leaveOutDays names it.`,
    ),
  ];
}

function degradedDay({
  component,
  day,
  factor,
  probabilityDegraded,
  occupations,
  verdict,
  subject,
  note,
}: DayExplanation): DegradedDayResult {
  return { component, day, factor, probabilityDegraded, occupations, verdict, subject, text: note.text };
}

/** The findings of all components in the lists of the results. */
export const dayResults = (judged: readonly JudgedDays[]): JudgedDays['results'] => ({
  dayModels: judged.flatMap(({ results }) => results.dayModels),
  dailyFactors: judged.flatMap(({ results }) => results.dailyFactors),
  degradedDays: judged.flatMap(({ results }) => results.degradedDays),
  timeOfDay: judged.flatMap(({ results }) => results.timeOfDay),
});

/** A spread of the days from which on the interval of a fit over all days is too narrow. */
const WIDE_SPREAD = 0.35;

/**
 * The interval of the ppm that the data allow: where days differ much, what either the scatter of the observed days or
 * the posterior of the day model allows. The first does not know of worse days to come, the second is too narrow where
 * many days were seen; docs/evidence-coverage.md shows both.
 */
export function ppmInterval(
  { ppm, interval }: ErrorModel,
  judged: Pick<JudgedDays, 'model'> | undefined,
): { readonly ppm: EstimateWithLimits; readonly interval: string } {
  const { estimate } = ppm;
  if (judged === undefined || estimate === null) return { ppm, interval };
  const { longRunPpm, tau, degradedDays } = judged.model;
  const disturbed = (degradedDays?.length ?? 0) > 0 || (tau.estimate ?? 0) > WIDE_SPREAD;
  if (!disturbed || longRunPpm.low === null || longRunPpm.high === null) return { ppm, interval };
  return {
    ppm: {
      estimate,
      low: Math.min(longRunPpm.low, ppm.low ?? estimate),
      high: Math.max(longRunPpm.high, ppm.high ?? estimate),
    },
    interval: `${interval}, widened by the posterior of the day model for days to come`,
  };
}
