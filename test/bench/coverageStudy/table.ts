import type { Tried, TriedCampaign, TriedComponent } from './tryCampaign.js';
import type { World } from './worlds.js';

export const HEAD = [
  '| world | days | campaigns | constant | ppm by days | ppm as stated | σ(10 km) | published constant | bias of constant, ppm | width of ppm | by day model | warned | design simulation |',
  '|---|---|---|---|---|---|---|---|---|---|---|---|---|',
].join('\n');

export const WRONG_HEAD = [
  '| world | days | wrong fixes a campaign | found | falsely named, of those named | falsely named, of all right ones |',
  '|---|---|---|---|---|---|',
].join('\n');

/** One line of the table of intervals: both components together. */
export function intervalLine(
  { kind, name, days, design }: World,
  campaigns: readonly TriedCampaign[],
): string {
  const all = campaigns.flatMap(({ components }) => components);
  const cover = (of: (component: TriedComponent) => Tried | null): string => coverage(campaigns, of);
  const bias = (of: (component: TriedComponent) => Tried): string => signedPercent(meanBias(all.map(of)));
  const share = (of: (component: TriedComponent) => boolean): string =>
    (all.filter(of).length / all.length).toFixed(2);
  const cells = [
    `${kind}, ${name}`,
    days,
    campaigns.length,
    cover(({ constant }) => constant),
    cover(({ ppm }) => ppm),
    cover(({ stated }) => stated),
    cover(({ sigma10 }) => sigma10),
    cover(({ absolute }) => absolute),
    `${bias(({ constant }) => constant)}, ${bias(({ ppm }) => ppm)}`,
    medianWidth(all).toFixed(2),
    share(({ fromDayModel }) => fromDayModel),
    share(({ warned }) => warned),
    design,
  ];
  return `| ${cells.join(' | ')} |`;
}

/** One line of the table of wrong fixes; null for a world without any. */
export function wrongLine(
  { kind, name, days, options }: World,
  campaigns: readonly TriedCampaign[],
): string | null {
  const sum = (of: (campaign: TriedCampaign) => number): number =>
    campaigns.reduce((total, campaign) => total + of(campaign), 0);
  const [wrong, found, suspected] = [sum((c) => c.wrong), sum((c) => c.found), sum((c) => c.suspected)];
  const right = sum((c) => c.occupations) - wrong;
  const ratio = (a: number, b: number): string => (b === 0 ? '-' : (a / b).toFixed(3));
  const perRight = ((suspected - found) / right).toExponential(1);
  if (options.wrongFixes === undefined && suspected === 0) return null;
  return `| ${kind}, ${name} | ${days} | ${(wrong / campaigns.length).toFixed(1)} | ${ratio(found, wrong)} | ${ratio(suspected - found, suspected)} | ${perRight} |`;
}

const inside = ({ low, high, truth }: Tried): number =>
  Number(low !== null && high !== null && low <= truth && truth <= high);

/** Share of intervals that hold the truth, with its Monte Carlo error by campaigns. */
function coverage(
  campaigns: readonly TriedCampaign[],
  of: (component: TriedComponent) => Tried | null,
): string {
  const shares = campaigns.flatMap(({ components }) => {
    const tried = components.map(of).filter((one) => one !== null);
    return tried.length === 0 ? [] : [tried.reduce((sum, one) => sum + inside(one), 0) / tried.length];
  });
  if (shares.length < campaigns.length / 2) return '-';
  const mean = shares.reduce((a, b) => a + b, 0) / shares.length;
  const square = shares.reduce((total, share) => total + (share - mean) ** 2, 0) / (shares.length - 1);
  return `${mean.toFixed(3)} ± ${Math.sqrt(square / shares.length).toFixed(3)}`;
}

function meanBias(tried: readonly Tried[]): number {
  const known = tried.filter(({ estimate }) => estimate !== null);
  return known.reduce((sum, { estimate, truth }) => sum + estimate! / truth - 1, 0) / known.length;
}

const signedPercent = (share: number): string =>
  `${share < 0 ? '−' : '+'}${Math.abs(100 * share).toFixed(1)} %`;

/** Median full width of the interval of the ppm by days, over the truth. */
function medianWidth(all: readonly TriedComponent[]): number {
  const widths = all
    .map(({ ppm: { low, high, truth } }) => ((high ?? Number.POSITIVE_INFINITY) - (low ?? 0)) / truth)
    .sort((a, b) => a - b);
  return widths[widths.length >> 1]!;
}
