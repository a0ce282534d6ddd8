import type { ReportPicture, ReportPictures } from './pictures.js';

/** Kinds of pictures, those first that a page can spare least. */
const BY_WORTH: readonly (keyof ReportPictures)[] = [
  'proof',
  'moves',
  'horizontal',
  'vertical',
  'days',
  'hours',
  'markMeans',
  'maps',
  'jobs',
  'wrongFixes',
  'sky',
  'splits',
  'hourDays',
];

/**
 * The pictures of a page with those left out that would make it too long: the words of such a picture stay, and the name
 * of its file.
 * @param mostBytes of all pictures as they stand in a page
 */
export function withinBudget(pictures: ReportPictures, mostBytes: number): ReportPictures {
  let spent = 0;
  const fitted = (picture: ReportPicture): ReportPicture => {
    // Base 64 writes three bytes as four characters.
    const bytes = (picture.svg.length * 4) / 3;
    if (spent + bytes > mostBytes) return { ...picture, tooLarge: true };
    spent += bytes;
    return picture;
  };
  const kept: Record<string, ReportPicture | readonly ReportPicture[] | null> = {};
  for (const kind of BY_WORTH) {
    const found = pictures[kind];
    kept[kind] = Array.isArray(found)
      ? (found as readonly ReportPicture[]).map(fitted)
      : found === null
        ? null
        : fitted(found as ReportPicture);
  }
  return kept as unknown as ReportPictures;
}
