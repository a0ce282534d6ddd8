import { apOfKp } from '../src/ionosphere/index.js';
import { randomStream } from '../src/stats/index.js';

const DAY_MS = 86_400_000;
/** Thirds of Kp in a quiet, an unsettled and a stormy interval: from, to. */
const QUIET = [0, 9] as const;
const STORM = [13, 20] as const;
/** Storms on days on which nothing else happened. */
const OTHER_STORMS = 3;

/**
 * Invented geomagnetic activity in the layout of the public daily file of Kp, ap, Ap, SN and F10.7 (Matzka et al. 2021),
 * from a day before the season to a day after it. Degraded days in a row fall into a storm, single ones into quiet days,
 * and storms come on ordinary days too: what goes with what is for the reader to find out.
 */
export function activityText(
  days: readonly { readonly day: string; readonly bad: boolean }[],
  seed: number,
): string {
  const random = randomStream(seed, 'activity');
  const stormy = stormDays(days, random);
  const [first, last] = [Date.parse(days[0]!.day) - DAY_MS, Date.parse(days.at(-1)!.day) + DAY_MS];
  const lines = Array.from({ length: (last - first) / DAY_MS + 1 }, (_, k) => {
    const ms = first + k * DAY_MS;
    const [from, to] = stormy.has(ms) ? STORM : QUIET;
    const thirds = Array.from({ length: 8 }, () => Math.floor(from + (to - from + 1) * random()));
    return row(
      ms,
      thirds.map((third) => Number((third / 3).toFixed(3))),
      165 + 20 * Math.sin(k / 4.3),
    );
  });
  return `${HEADER}${lines.join('\n')}\n`;
}

/** UTC days of the storms. */
function stormDays(
  days: readonly { readonly day: string; readonly bad: boolean }[],
  random: () => number,
): Set<number> {
  const storms = new Set<number>();
  days.forEach(({ day, bad }, k) => {
    const next = days[k + 1];
    if (!bad || next?.bad !== true) return;
    for (let ms = Date.parse(day); ms <= Date.parse(next.day); ms += DAY_MS) storms.add(ms);
  });
  const ordinary = days.filter(
    ({ bad }, k) => !bad && days[k - 1]?.bad !== true && days[k + 1]?.bad !== true,
  );
  for (let k = 0; k < OTHER_STORMS; k++) {
    storms.add(Date.parse(ordinary[Math.floor(random() * ordinary.length)]!.day));
  }
  return storms;
}

function row(ms: number, kp: readonly number[], flux: number): string {
  const [year, month, day] = new Date(ms).toISOString().slice(0, 10).split('-');
  const number = (ms - Date.UTC(1932, 0, 1)) / DAY_MS;
  const rotation = number + 9;
  const ap = kp.map(apOfKp);
  const daily = Math.round(ap.reduce((a, b) => a + b) / 8);
  return [
    `${year} ${month} ${day} ${number} ${(number + 0.5).toFixed(1)}`,
    `${Math.floor(rotation / 27) + 1352} ${String((rotation % 27) + 1).padStart(2)} `,
    kp.map((value) => value.toFixed(3).padStart(6)).join(' '),
    ap.map((value) => String(value).padStart(4)).join(' '),
    ` ${String(daily).padStart(4)}  -1 ${flux.toFixed(1).padStart(8)} ${flux.toFixed(1).padStart(8)} 2`,
  ].join(' ');
}

const HEADER = `# INVENTED activity for the invented season of the demo study: nobody measured these values.
# The layout is that of the public daily file of Kp, ap, Ap, SN and F10.7. SN is not given (-1).
# YYYY MM DD days days_m Bsr dB Kp1 Kp2 Kp3 Kp4 Kp5 Kp6 Kp7 Kp8 ap1 ap2 ap3 ap4 ap5 ap6 ap7 ap8 Ap SN F10.7obs F10.7adj D
`;
