/** The files of a starter study, by name. */
export const STARTER_FILES: Readonly<Record<string, string>> = {
  'study.yaml': `# yaml-language-server: $schema=./study.schema.json
# Only "marks", "bases" and "logs" are required. Paths are relative to this file.

title: Check shots

# Zone of your days, as an IANA name or an offset from UTC such as "+02:00". Without it a day is the local mean solar
# day at the base.
# timeZone: Europe/Lisbon

# Coordinates of marks, bases and logs: geographic (degrees, WGS 84), geocentric (metres), a code of the EPSG
# register such as EPSG:25829, or a proj string such as "+proj=utm +zone=29 +ellps=GRS80".
coordinates: geographic

# Heights are ellipsoidal unless you say otherwise; marks, bases and each log may have heights of their own, and a geoid
# separation leads from one kind to the other (geoid: column, constant or grid):
# heights: {kind: orthometric, geoid: grid, file: geoid.asc}

marks: marks.csv
# Where logs name marks inside longer texts, such as "CHK A3 ok", a regular expression (of JavaScript) reads them out:
# marks: {file: marks.csv, names: {pattern: 'CHK (\\w+)'}}
bases: bases.csv
logs:
  - files: logs/*.csv
    # "npx ppmwise layout logs/FILE" prints what to put here, and asks for what a file does not say:
    # layout:
    #   kind: delimited
    #   columns: {mark: Point, latitude: Lat, longitude: Lon, height: Ellipsoid height}
    #   fixValues: {1: fixed, 2: float}
    # Only positions from a single base are fitted. Where the log does not tell from where corrections came:
    # corrections: single-base
    # Where the log gives the coordinates that the base was run with, and they are not those of bases.csv:
    # moveToPublishedBase: true

# What your clients demand; each line becomes a rule. Horizontal limits are radial.
tolerances:
  - {component: horizontal, limitMm: 25, share: 0.95}
  - {component: vertical, limitMm: 40, share: 0.95}

# What the data sheet of your receivers says, to be compared with what your shots show. State what its
# words mean: form (root-sum-square | linear-sum), axis (radial | per-axis), level (rms | 68 | 95).
# specSheet: {horizontal: {constantMm: 8, ppm: 1}, vertical: {constantMm: 15, ppm: 1}, form: linear-sum, axis: radial, level: rms}
`,
  'marks.csv': `# One row a mark: coordinates from an independent source, not from the base that is tested.
# Replace the example. A blank coordinate means not known.
# Precisions are mm and need their level (rms, 68 or 95). sky: open, partly or obstructed.
mark,latitude,longitude,height,horizontalSigmaMm,verticalSigmaMm,sigmaLevel,source,frame,epoch,sky
EXAMPLE,44.310886625,-18.400700010,133.7214,4,8,rms,static session,,,open
`,
  'bases.csv': `# One row a base point. mounting: pillar (keeps its place overnight) or tripod (a new setup every day).
base,latitude,longitude,height,mounting
EXAMPLE-BASE,44.312640518,-18.405217364,148.2163,tripod
`,
  'README.md': `# Check shots

Needs Node.js 20.19 or newer. Run \`npm install\` in this folder once.

1. \`npm run notebook\` opens the notebooks, which show the invented study in \`demo/\`: begin with \`01-own-ppm\`.
2. Put your marks and bases into \`marks.csv\` and \`bases.csv\` in place of the examples, your exported logs into \`logs/\`.
3. \`npx ppmwise layout logs/*\` says what it makes of the logs; paste its answer into \`study.yaml\` where it asks for something.
4. \`npx ppmwise check study.yaml\` reads and accounts for every row; \`npx ppmwise run study.yaml\` writes \`results/report.html\`.
5. In the first cell of a notebook put \`../study.yaml\` in place of \`../demo/study.yaml\`, to look at your own shots.
6. A rule needs 15 days, better 30, with near and far marks; it reaches as far as two marks with 20 occupations on 5 days lie.
`,
};
