import { type Html, html } from './html.js';

/** A drawn chart: an SVG picture and what it shows, in words. */
export interface ReportPicture {
  readonly svg: string;
  readonly description: string;
  /** Its file beside the pages. */
  readonly file?: string | undefined;
  /** Not shown, since the page would be too long. */
  readonly tooLarge?: boolean | undefined;
}

/** Pictures of the pages; null where there was nothing to draw. */
export interface ReportPictures {
  /** Share of positions inside the limit on unseen days, by distance. */
  readonly proof: ReportPicture | null;
  /** How the limit moves. */
  readonly moves: ReportPicture | null;
  readonly horizontal: ReportPicture | null;
  readonly vertical: ReportPicture | null;
  /** One for each base. */
  readonly maps: readonly ReportPicture[];
  readonly markMeans: ReportPicture | null;
  /** Days and the sky; hours of the day; both at once. */
  readonly days: readonly ReportPicture[];
  readonly hours: readonly ReportPicture[];
  readonly hourDays: readonly ReportPicture[];
  readonly splits: readonly ReportPicture[];
  /** What went with the sky. */
  readonly sky: readonly ReportPicture[];
  /** How the share of wrong fixes grows with distance. */
  readonly wrongFixes: readonly ReportPicture[];
  /** Points of jobs and which base reaches them. */
  readonly jobs: readonly ReportPicture[];
}

/** A picture inside the page, with its words for those who do not see it. */
export function figure(picture: ReportPicture | null): Html | null {
  if (picture === null) return null;
  const { svg, description, file, tooLarge } = picture;
  if (tooLarge)
    return html`<p class="small">Too large for this page${file === undefined ? '' : `, see ${file}`}: ${description}</p>\n`;
  const source = `data:image/svg+xml;base64,${Buffer.from(svg, 'utf8').toString('base64')}`;
  return html`<figure><img src="${source}" alt="${description}"></figure>\n`;
}
