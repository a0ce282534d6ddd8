import type { OccupationError } from '../errors/index.js';
import {
  daysWithFarShots,
  type ErrorModel,
  firstAndLast,
  fitByGroup,
  fitTerms,
  goesWithDistance,
  type InformationBy,
  informationShares,
  reshots,
  type Term,
  type TermsModel,
} from '../fit/index.js';
import { InputError, type Message, message } from '../logs/index.js';
import { randomStream } from '../stats/index.js';
import { type ComponentFits, ofComponent } from './fitComponents.js';
import type { Results } from './results.js';
import type { Study } from './study.js';

/** On what the fits rest, and what else could be behind them. */
export interface StudyEvidence {
  readonly results: Pick<Results, 'terms' | 'groups' | 'evidence'>;
  readonly messages: readonly Message[];
}

const INFORMATION_BY: readonly InformationBy[] = ['mark', 'day', 'direction', 'crew'];
/** So many of the largest shares of a kind are kept. */
const MOST_SHARES = 5;
/** Below this many groups nothing can be compared. */
const FEWEST_GROUPS = 2;

/** Whether an error has what a term needs. */
const TERM_VALUES: Readonly<Record<Term, (error: OccupationError) => boolean>> = {
  'height-difference': ({ heightDifferenceM }) => !Number.isNaN(heightDifferenceM),
  pdop: ({ pdop }) => !Number.isNaN(pdop),
  'reported-sigma': ({ reportedHorizontalMm }) => !Number.isNaN(reportedHorizontalMm),
};

/**
 * Further terms, crews, rovers and bases apart, and how much the ppm of each component rests on what. A comparison that
 * the data do not allow is left out, with the message that says why.
 */
export function studyEvidence(
  errors: readonly OccupationError[],
  weights: Float64Array | null,
  components: readonly ComponentFits[],
  study: Study,
): StudyEvidence {
  const messages: Message[] = [];
  const own = weights ?? undefined;
  const possible = <T>(make: () => T): T[] => {
    try {
      return [make()];
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      messages.push(...error.messages.map((told) => ({ ...told, severity: 'warning' as const })));
      return [];
    }
  };
  const models = components.map(({ basis }) => basis);
  const absent = new Set(study.terms.filter((term) => !errors.some((error) => TERM_VALUES[term](error))));
  for (const term of absent) {
    messages.push(
      message(
        'warning',
        'term-without-values',
        `Expected values for the term "${term}" in the logs, came none. Leave the term out, or export the column.`,
      ),
    );
  }
  const terms = models.flatMap(({ component, confidence }) => {
    const wanted = study.terms.filter(
      (term) => (term !== 'height-difference' || component === 'vertical') && !absent.has(term),
    );
    const knownSigmas = { centringMm: study.centringSigmaMm, ...markSigma(components, component) };
    if (wanted.length === 0 && study.centringSigmaMm === 0) return [];
    return possible(() =>
      fitTerms(errors, { component, terms: wanted, knownSigmas, confidence, weights: own }),
    );
  });
  const groups = study.by
    .filter((by) => new Set(errors.map((error) => error[by])).size >= FEWEST_GROUPS)
    .flatMap((by) =>
      models.flatMap(({ component, reference, confidence }) =>
        possible(() =>
          fitByGroup(errors, {
            by,
            component,
            reference,
            confidence,
            weights: own,
            random: randomStream(study.seed, `groups ${by} ${component}`),
          }),
        ),
      ),
    );
  const evidence = models.flatMap((model) => possible(() => evidenceOf(errors, model, own, messages)));
  const shared = errors.length === 0 ? [] : [...goesWithDistance(errors).notes, ...reshots(errors).notes];
  return {
    results: {
      terms: terms.map(termsResult),
      groups: groups.map(({ message: _, ...group }) => group),
      evidence,
    },
    messages: [
      ...messages,
      ...terms.flatMap(({ notes }) => notes),
      ...groups.map(({ message }) => message),
      ...shared,
    ],
  };
}

/** Spread of the marks' own errors, which a fit of repeatability does not hold and an absolute one does. */
function markSigma(
  components: readonly ComponentFits[],
  component: ErrorModel['component'],
): { readonly markMm?: number } {
  const found = components.find((each) => each.component === component)?.markComponent?.sigmaMm.estimate;
  return found == null ? {} : { markMm: found };
}

const termsResult = ({ notes: _, ...rest }: TermsModel): Results['terms'][number] => ({
  ...rest,
  component: rest.component as ErrorModel['component'],
});

function evidenceOf(
  errors: readonly OccupationError[],
  model: ErrorModel,
  weights: Float64Array | undefined,
  messages: Message[],
): Results['evidence'][number] {
  const { component, reference, confidence, ppm, constantMm } = model;
  const common = { component, reference, confidence, weights };
  const shares = INFORMATION_BY.filter((by) => by !== 'crew' || errors.some(({ crew }) => crew !== '')).map(
    (by) => informationShares(errors, model, by, { weights }),
  );
  const tell = (notes: readonly Message[]): void => {
    messages.push(...notes.map((note) => ofComponent(component, note)));
  };
  tell(shares.flatMap(({ notes }) => notes));
  // Where the distance part exceeds the constant shots speak of the ppm.
  const farKm = ppm.estimate ? (constantMm.estimate ?? 0) / ppm.estimate : null;
  const farDays = farKm === null || farKm <= 0 ? null : daysWithFarShots(errors, { ...common, farKm });
  const pairs = firstAndLast(errors, common);
  tell([...(farDays === null ? [] : [farDays.message]), pairs.message]);
  return {
    component,
    shares: shares.map(({ by, shares: list }) => ({
      by,
      largest: list.slice(0, MOST_SHARES),
      groups: list.length,
    })),
    companions: goesWithDistance(errors).companions,
    daysWithFarShots: farDays && {
      farKm: farKm!,
      daysWithFar: farDays.daysWithFar,
      daysWithoutFar: farDays.daysWithoutFar,
      near: farDays.near,
    },
    firstAndLast: { visits: pairs.visits, days: pairs.days, first: pairs.first },
  };
}
