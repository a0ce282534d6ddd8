import { html } from './html.js';

/** How the numbers are made, in plain words. */
export const METHOD = html`<section id="method"><h2>How the numbers are made</h2>
<p>The fixed positions of a visit are averaged to one occupation. Its error is measured minus known, in east, north and up
at the mark. A model with a constant and a part that grows with distance is fitted to the squares of the errors by
maximum likelihood, so that near and far shots each count by what they tell.</p>
<p>Shots of one day share their sky, their crew and their base, so they are not independent. The intervals therefore count
days, not shots. A rule takes the upper limit of the spread, not its estimate, and stops where the data stop.</p>
<p>Nothing is thrown away in silence: every row of the logs is used or set aside with a reason, and every occupation that was
set aside is named in the annex.</p>
</section>
`;
