import { type DayExplanation, LEVEL, type TestedCondition } from './dayExplanation.js';

type Facts = Omit<DayExplanation, 'note'>;

/** Verdict, numbers and what to do, in two to four sentences. */
export function explanationText(facts: Facts): string {
  const { day, component, factor, conditions } = facts;
  const head = `On ${day} the ${component} ppm was ${factor.toFixed(1)} times that of the median day`;
  const unusual = conditions.filter((each) => each.unusual).map(conditionText);
  const beside = unusual.length === 0 ? '' : ` Out of the ordinary that day: ${unusual.join('; ')}.`;
  return `${head}: ${cause(facts)}${partOfIt(facts)}${beside} ${remedy(facts)}`;
}

function cause(facts: Facts): string {
  const { verdict, subject, setups, mark, crew, receiver } = facts;
  const rest = (part: { occupations: number; restEvidence: number } | null): string =>
    `${part!.occupations} shots; the others are ${times(part!.restEvidence)} as probable on an ordinary day as on a degraded one`;
  switch (verdict) {
    case 'one mark':
      return `one mark, ${subject} (${rest(mark)}).`;
    case 'bad setup': {
      const { offsetMm, usualMm } = setups.find(({ setup }) => setup === subject)!;
      return `a bad setup, ${subject}, all of whose shots are off by ${offsetMm.toFixed(0)} mm (usual are ${usualMm.toFixed(0)} mm); without the offset the day does not look degraded.`;
    }
    case 'one crew':
      return `one crew, ${subject} (${rest(crew)})${receiver === null ? '' : `, or its receiver ${receiver.name}, which cannot be told apart that day`}.`;
    case 'one receiver':
      return `one receiver, ${subject} (${rest(receiver)}).`;
    case 'grows with distance':
      return 'the error grows with distance, whichever mark is left out, and no setup, mark, crew or receiver explains it.';
    case 'not explained':
      return 'not explained by setup, mark, crew or receiver, and not clearly growing with distance.';
  }
}

/** An offset of a setup that is real and does not suffice. */
function partOfIt({ verdict, setups }: Facts): string {
  if (verdict === 'bad setup') return '';
  return setups
    .filter(({ adjustedP }) => adjustedP < LEVEL)
    .map(
      ({ setup, offsetMm, usualMm }) =>
        ` Setup ${setup} is off by ${offsetMm.toFixed(0)} mm (usual are ${usualMm.toFixed(0)} mm), which explains a part at most.`,
    )
    .join('');
}

function remedy({ verdict }: Facts): string {
  switch (verdict) {
    case 'one mark':
      return 'Look at the mark: was it the right one, is it intact? The day stays in the fit.';
    case 'bad setup':
      return 'Look at the base of that day: centring, antenna height, coordinates. The day stays in the fit.';
    case 'one crew':
    case 'one receiver':
      return 'Ask what was different there that day: pole, antenna, settings. The day stays in the fit.';
    case 'grows with distance':
      return 'Compare with the records of the ionosphere. The day stays in the fit.';
    case 'not explained':
      return 'Look at the shots of that day. It stays in the fit.';
  }
}

const times = (evidence: number): string =>
  evidence > 1000 ? 'more than 1000 times' : `${Math.floor(evidence)} times`;

const conditionText = ({ name, value, usual }: TestedCondition): string =>
  name === 'share of visits without a fix'
    ? `${(100 * value).toFixed(0)} % of the visits without a fix (usual ${(100 * usual).toFixed(0)} %)`
    : `${name} ${value.toFixed(1)} (usual ${usual.toFixed(1)})`;
