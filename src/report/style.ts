/**
 * Style sheet of all pages: one column to read, tables that do not break on paper, room for a phone, and everything
 * readable in grey.
 */
export const PAGE_STYLE = `
:root { --ink: #22303c; --quiet: #4a5a66; --water: #2b6c8f; --brick: #9c4a33; --mist: #dfe6ea; }
* { box-sizing: border-box; }
html { -webkit-text-size-adjust: 100%; }
body { margin: 0; color: var(--ink); background: #fff; font: 16px/1.55 Georgia, 'Times New Roman', serif; }
main { max-width: 50rem; margin: 0 auto; padding: 2.5rem 1.25rem 4rem; }
.annex main { max-width: 64rem; }
h1 { font-size: 1.9rem; line-height: 1.2; margin: 0 0 .3rem; }
h2 { font-size: 1.3rem; margin: 2.6rem 0 .6rem; padding-top: .6rem; border-top: 2px solid var(--ink); break-after: avoid; }
p, ul { margin: .5rem 0; } ul { padding-left: 1.3rem; } li { margin: .25rem 0; }
p, li { orphans: 3; widows: 3; } p:has(+ ul), p:has(+ figure) { break-after: avoid; }
.lead { color: var(--quiet); margin-bottom: .6rem; }
a { color: var(--water); } a:focus-visible, .scroll:focus-visible { outline: 3px solid var(--water); outline-offset: 2px; }
nav ul { columns: 2; padding-left: 1.2rem; }
/* What must be looked at before the rules are used. */
.first { border: 1.5px solid var(--brick); padding: .5rem .8rem; break-inside: avoid; }
.rules { list-style: none; margin: 1rem 0; padding: 0; }
.rules li { border-left: 6px solid var(--water); padding: .5rem 0 .5rem 1rem; margin: .7rem 0; break-inside: avoid; }
.rules li.none { border-left: 6px double var(--quiet); }
.rules strong { font-size: 1.25rem; display: block; }
.rules .sentence { display: block; }
.scroll { overflow-x: auto; margin: .8rem 0; }
table { border-collapse: collapse; width: 100%; font: .86rem/1.4 'Helvetica Neue', Arial, sans-serif; font-variant-numeric: tabular-nums; }
caption { text-align: left; font-weight: bold; padding: .2rem 0 .4rem; }
th, td { padding: .3rem .4rem; border-bottom: 1px solid var(--mist); text-align: left; vertical-align: top; overflow-wrap: break-word; }
thead th { border-bottom: 1.5px solid var(--ink); vertical-align: bottom; } tbody th { font-weight: normal; }
td.number { text-align: right; white-space: nowrap; } th.number { text-align: right; } .date { white-space: nowrap; }
tr { break-inside: avoid; }
thead { display: table-header-group; }
code { font: .82em/1.3 'DejaVu Sans Mono', Consolas, monospace; overflow-wrap: anywhere; }
.small { font: .86rem/1.45 'Helvetica Neue', Arial, sans-serif; color: var(--quiet); }
figure { margin: 1.2rem 0; break-inside: avoid; overflow-x: auto; }
figure img { width: 100%; min-width: 27rem; height: auto; display: block; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .25rem 1rem; }
dt { font-weight: bold; } dd { margin: 0; }
.blank { display: inline-block; width: 16rem; max-width: 100%; border-bottom: 1px solid var(--ink); height: 1.6em; }
.signature dt { font-weight: normal; align-self: end; }
section#signature { break-inside: avoid; }
.messages li { margin: .35rem 0; overflow-wrap: anywhere; }
.cautions { border: 1.5px solid var(--brick); padding: .4rem 1rem; break-inside: avoid; }
/* Cards: black on white, one page, for a clipboard. */
.card { color: #000; font: 15px/1.4 'Helvetica Neue', Arial, sans-serif; }
.card main { max-width: 46rem; padding: 1.2rem; }
.card h1 { font-size: 1.5rem; } .card h2 { font-size: 1.05rem; margin: 1rem 0 .3rem; padding-top: .4rem; border-color: #000; }
.card .small, .card .lead { color: #000; }
.card th, .card td { border-color: #000; } .card td.number { font-size: 1.05em; }
.card .big td.number { font-size: 1.35em; font-weight: bold; }
/* Narrow tables side by side where there is room. */
.pair { display: grid; grid-template-columns: repeat(auto-fit, minmax(17rem, 1fr)); gap: 0 1.6rem; }
.card .pair { break-inside: avoid; } .card dl { margin: .2rem 0; }
.card ol { margin: .3rem 0; padding-left: 1.4rem; } .card li { margin: .15rem 0; }
@media (max-width: 34rem) {
  body { font-size: 15px; } main { padding: 1.4rem .9rem 3rem; } h1 { font-size: 1.5rem; }
  dl { display: block; } dd { margin: 0 0 .5rem; } nav ul { columns: 1; }
}
@media print {
  @page { margin: 16mm 15mm; }
  body { font-size: 10.5pt; } main, .annex main, .card main { max-width: none; padding: 0; }
  a { color: inherit; text-decoration: none; }
  figure, .scroll { overflow: visible; } figure img { min-width: 0; width: auto; max-width: 100%; max-height: 118mm; margin: 0 auto; }
  table { break-inside: avoid; font-size: 8.6pt; } table.long { break-inside: auto; } caption { break-after: avoid; }
  .annex table { font-size: 7.6pt; } .annex th, .annex td { padding: .2rem .3rem; }
  h2 { margin-top: 1.6rem; }
  .card { font-size: 9.6pt; } .card main { max-width: 178mm; } .card h2 { margin: .55rem 0 .15rem; padding-top: .25rem; }
  .card table { font-size: 9pt; } .card th, .card td { padding: .12rem .3rem; } .card .scroll { margin: .3rem 0; }
  .card .small { font-size: 8.4pt; margin: .25rem 0; } .card h1 { font-size: 15pt; } .card p { margin: .25rem 0; }
  .card dl { font-size: 9pt; gap: .05rem 1rem; } .card .lead { margin: 0; }
}
`;
