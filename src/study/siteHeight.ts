import type { OccupationError } from '../errors/index.js';
import { InputError, type Message, message } from '../logs/index.js';
import { type HeightAllowance, heightAllowance } from '../rule/index.js';
import type { TermsResult } from './evidenceResultTypes.js';
import type { Study } from './study.js';

/** What the stated site adds to vertical rules; undefined without a site, or with a message why it cannot be told. */
export function siteHeight(
  errors: readonly OccupationError[],
  terms: readonly TermsResult[],
  { siteHeightDifferenceM: differenceM }: Pick<Study, 'siteHeightDifferenceM'>,
): { height: HeightAllowance | undefined; messages: Message[] } {
  if (differenceM === null) return { height: undefined, messages: [] };
  const vertical = terms.find(({ component }) => component === 'vertical');
  const seenM = errors
    .filter(({ up, heightDifferenceM }) => !Number.isNaN(up + heightDifferenceM))
    .reduce((most, { heightDifferenceM }) => Math.max(most, Math.abs(heightDifferenceM)), 0);
  try {
    if (vertical !== undefined) {
      return { height: heightAllowance(vertical, differenceM, seenM), messages: [] };
    }
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
  }
  return {
    height: undefined,
    messages: [
      message(
        'warning',
        'site-without-height-term',
        `Expected a fitted height-difference term for the site ${Math.abs(differenceM)} m ${differenceM < 0 ? 'below' : 'above'} its base, came none: the vertical rules hold for height differences as the marks have them, and not for the site. Add terms: [height-difference], and shots on marks at several heights on 4 days or more.`,
      ),
    ],
  };
}
