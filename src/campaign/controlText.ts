import type { CampaignMark } from './marks.js';
import type { CampaignBase, CampaignSettings } from './options.js';

/** The list of marks as comma-separated text: published coordinates, stated standard deviations per axis. */
export function marksText(
  marks: readonly CampaignMark[],
  stated: CampaignSettings['statedMarkSigmaMm'],
): string {
  const lines = marks.map((mark) =>
    [mark.name, ...coordinates(mark), stated.horizontal, stated.vertical, 'rms', mark.source, mark.sky].join(
      ',',
    ),
  );
  const header = 'mark,latitude,longitude,height,horizontalSigmaMm,verticalSigmaMm,sigmaLevel,source,sky';
  return `${[header, ...lines].join('\n')}\n`;
}

/** The list of bases as comma-separated text. */
export function basesText(bases: readonly CampaignBase[]): string {
  const lines = bases.map((base) => [base.name, ...coordinates(base), base.mounting].join(','));
  return `${['base,latitude,longitude,height,mounting', ...lines].join('\n')}\n`;
}

const coordinates = (point: { latitudeDeg: number; longitudeDeg: number; heightM: number }): string[] => [
  point.latitudeDeg.toFixed(9),
  point.longitudeDeg.toFixed(9),
  point.heightM.toFixed(4),
];
