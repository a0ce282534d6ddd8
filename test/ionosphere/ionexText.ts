/** Writes small files in the IONEX format, for tests: every line 80 columns, label from column 61. */
export interface IonexOptions {
  readonly latitudes?: readonly [number, number, number];
  readonly longitudes?: readonly [number, number, number];
  readonly heightKm?: number;
  readonly intervalSeconds?: number;
  readonly exponent?: number | null;
  readonly mapCount?: number;
  readonly version?: string;
}

export interface MapText {
  readonly kind?: 'TEC' | 'RMS' | 'HEIGHT';
  /** Year, month, day, hour, minute, second. */
  readonly epoch: readonly number[];
  /** Whole number at a node. */
  readonly value: (latitude: number, longitude: number) => number;
  /** Lines before each latitude, by its index. */
  readonly before?: (row: number) => readonly string[];
}

export const labelled = (content: string, label: string): string =>
  `${content.padEnd(60)}${label.padEnd(20)}`;
const right = (value: number | string, width: number): string => String(value).padStart(width);
const f6 = (value: number): string => right(value.toFixed(1), 6);
const epochLine = (epoch: readonly number[], label: string): string =>
  labelled(epoch.map((part) => right(part, 6)).join(''), label);
export const exponentLine = (exponent: number): string => labelled(right(exponent, 6), 'EXPONENT');

function nodes([first, last, step]: readonly [number, number, number]): number[] {
  return Array.from({ length: Math.round((last - first) / step) + 1 }, (_, k) => first + k * step);
}

export function ionexLines(maps: readonly MapText[], options: IonexOptions = {}): string[] {
  const {
    latitudes = [50, 40, -5],
    longitudes = [-10, 10, 5],
    heightKm = 450,
    intervalSeconds = 7200,
    exponent = -1,
    version = '1.0',
  } = options;
  const tec = maps.filter(({ kind = 'TEC' }) => kind === 'TEC');
  const { mapCount = tec.length } = options;
  const grid = (three: readonly number[]): string => `  ${three.map(f6).join('')}`;
  const lines = [
    labelled(`${right(version, 8)}            IONOSPHERE MAPS     GNSS`, 'IONEX VERSION / TYPE'),
    labelled('', 'PGM / RUN BY / DATE'),
    labelled('invented', 'COMMENT'),
    epochLine(tec[0]?.epoch ?? [2025, 3, 1, 0, 0, 0], 'EPOCH OF FIRST MAP'),
    epochLine(tec.at(-1)?.epoch ?? [2025, 3, 1, 0, 0, 0], 'EPOCH OF LAST MAP'),
    labelled(right(intervalSeconds, 6), 'INTERVAL'),
    labelled(right(mapCount, 6), '# OF MAPS IN FILE'),
    labelled('  COSZ', 'MAPPING FUNCTION'),
    labelled(right('10.0', 8), 'ELEVATION CUTOFF'),
    labelled(right('6371.0', 8), 'BASE RADIUS'),
    labelled(right(2, 6), 'MAP DIMENSION'),
    labelled(grid([heightKm, heightKm, 0]), 'HGT1 / HGT2 / DHGT'),
    labelled(grid(latitudes), 'LAT1 / LAT2 / DLAT'),
    labelled(grid(longitudes), 'LON1 / LON2 / DLON'),
    ...(exponent === null ? [] : [exponentLine(exponent)]),
    labelled('', 'END OF HEADER'),
  ];
  maps.forEach(({ kind = 'TEC', epoch, value, before }, index) => {
    lines.push(labelled(right(index + 1, 6), `START OF ${kind} MAP`));
    lines.push(epochLine(epoch, 'EPOCH OF CURRENT MAP'));
    nodes(latitudes).forEach((latitude, row) => {
      lines.push(...(before?.(row) ?? []));
      lines.push(
        labelled(`  ${[latitude, ...longitudes, heightKm].map(f6).join('')}`, 'LAT/LON1/LON2/DLON/H'),
      );
      const values = nodes(longitudes).map((longitude) => right(value(latitude, longitude), 5));
      for (let k = 0; k < values.length; k += 16) lines.push(values.slice(k, k + 16).join(''));
    });
    lines.push(labelled(right(index + 1, 6), `END OF ${kind} MAP`));
  });
  lines.push(labelled('', 'END OF FILE'));
  return lines;
}

export const ionexText = (maps: readonly MapText[], options: IonexOptions = {}): string =>
  `${ionexLines(maps, options).join('\n')}\n`;
