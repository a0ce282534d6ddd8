/** Style sheet of the report: one column to read, tables that do not break on paper, and room for a phone. */
export const REPORT_STYLE = `
:root { --ink: #22303c; --water: #2b6c8f; --ochre: #b9812b; --brick: #9c4a33; --mist: #dfe6ea; }
* { box-sizing: border-box; }
body { margin: 0; color: var(--ink); background: #fff; font: 16px/1.55 Georgia, 'Times New Roman', serif; }
main { max-width: 50rem; margin: 0 auto; padding: 2.5rem 1.25rem 4rem; }
h1 { font-size: 1.9rem; line-height: 1.2; margin: 0 0 .3rem; }
h2 { font-size: 1.3rem; margin: 2.6rem 0 .6rem; padding-top: .6rem; border-top: 2px solid var(--ink); break-after: avoid; }
p { margin: .5rem 0; }
.lead { color: #4a5a66; margin-bottom: 1.6rem; }
/* What must be looked at before the rules are used. */
.first { border: 1.5px solid var(--brick); padding: .5rem .8rem; break-inside: avoid; }
.rules { list-style: none; margin: 1rem 0; padding: 0; }
.rules li { border-left: 6px solid var(--water); padding: .5rem 0 .5rem 1rem; margin: .7rem 0; break-inside: avoid; }
.rules li.none { border-left-color: var(--mist); }
.rules strong { font-size: 1.25rem; display: block; }
.rules span { display: block; }
.scroll { overflow-x: auto; margin: .8rem 0; }
table { border-collapse: collapse; width: 100%; font: .86rem/1.4 'Helvetica Neue', Arial, sans-serif; font-variant-numeric: tabular-nums; }
caption { text-align: left; font-weight: bold; padding: .2rem 0 .4rem; }
th, td { padding: .3rem .4rem; border-bottom: 1px solid var(--mist); text-align: left; vertical-align: top; }
th { border-bottom: 1.5px solid var(--ink); }
td.number { text-align: right; white-space: nowrap; } th.number { text-align: right; } .date { white-space: nowrap; }
tr { break-inside: avoid; }
thead { display: table-header-group; }
.small { font: .86rem/1.45 'Helvetica Neue', Arial, sans-serif; color: #4a5a66; }
figure { margin: 1.2rem 0; break-inside: avoid; overflow-x: auto; }
figure img { width: 100%; min-width: 27rem; height: auto; display: block; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .25rem 1rem; }
dt { font-weight: bold; } dd { margin: 0; }
.messages li { margin: .35rem 0; overflow-wrap: anywhere; }
.cautions { border: 1.5px solid var(--brick); padding: .4rem 1rem; break-inside: avoid; }
@media (max-width: 34rem) {
  body { font-size: 15px; } main { padding: 1.4rem .9rem 3rem; } h1 { font-size: 1.5rem; }
  dl { display: block; } dd { margin: 0 0 .5rem; }
}
@media print {
  @page { margin: 18mm 16mm; }
  body { font-size: 10.5pt; } main { max-width: none; padding: 0; }
  figure, .scroll { overflow: visible; } figure img { min-width: 0; width: auto; max-width: 100%; max-height: 102mm; margin: 0 auto; }
  table { break-inside: avoid; } caption { break-after: avoid; }
  h2 { margin-top: 1.6rem; } table { font-size: 8.6pt; }
}
`;
