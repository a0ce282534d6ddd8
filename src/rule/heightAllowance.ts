import type { TermsModel } from '../fit/index.js';
import { inputError } from '../logs/index.js';
import type { HeightAllowance } from './ground.js';

/**
 * What the fitted height term allows for a site far above or below its base: its upper limit, because the rule must not
 * rest on a term that is too small by chance.
 * @param terms a vertical fit with the term `height-difference`
 * @param differenceM site minus base, m
 * @param seenM largest height difference among the shots, m; a site beyond it has no rule
 * @throws InputError when the term was not fitted or has no limit
 */
export function heightAllowance(
  terms: Pick<TermsModel, 'terms'>,
  differenceM: number,
  seenM?: number | undefined,
): HeightAllowance {
  const term = terms.terms.find((each) => each.term === 'height-difference');
  if (term === undefined || term.high === null) {
    throw inputError(
      'no-height-term',
      'Expected a fit with an upper limit of the height-difference term, came one without. Fit the vertical errors with terms: ["height-difference"], from marks at several heights on 4 days or more.',
    );
  }
  return { differenceM, mmPer100M: term.high, seenM };
}
