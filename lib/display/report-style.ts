/** The style sheet of the report: one column, readable on a phone, on paper and in the dark. */
export const REPORT_STYLE = `
:root { color-scheme: light dark; --ink: #1d2932; --faint: #5a666f; --line: #c9d0d5;
  --ground: #ffffff; --soft: #f3f5f6; --good: #0d5c3b; --warn: #9a3412; }
@media (prefers-color-scheme: dark) { :root { --ink: #e4e9ec; --faint: #a3afb7; --line: #46525a;
  --ground: #14191d; --soft: #1e262b; --good: #6fcf97; --warn: #f2a97e; } }
* { box-sizing: border-box; }
body { margin: 0 auto; padding: 1.5rem 1.2rem 4rem; max-width: 60rem; color: var(--ink);
  background: var(--ground); font: 1rem/1.5 system-ui, "Segoe UI", Helvetica, Arial, sans-serif; }
h1 { font-size: 1.1rem; font-weight: 600; color: var(--faint); margin: 0 0 .8rem; }
h2 { font-size: 1.2rem; margin: 2.4rem 0 .5rem; padding-top: .6rem;
  border-top: 1px solid var(--line); }
h3 { font-size: 1rem; margin: 1.4rem 0 .3rem; }
p { max-width: 44rem; margin: .5rem 0; }
.headline { max-width: none; font-size: 1.7rem; line-height: 1.25; font-weight: 650; margin: .2rem 0 .7rem; }
.standing { display: inline-block; border: 2px solid currentColor; border-radius: .4rem;
  padding: .1rem .6rem; font-weight: 650; margin-right: .5rem; }
.good { color: var(--good); } .warn { color: var(--warn); }
.remark { border-left: 4px solid var(--warn); padding-left: .7rem; }
dl.figures { display: grid; grid-template-columns: repeat(auto-fit, minmax(8.5rem, 1fr));
  gap: .6rem; margin: 1rem 0; padding: 0; }
dl.figures div { background: var(--soft); border-radius: .5rem; padding: .55rem .8rem; }
dl.figures dt { color: var(--faint); font-size: .85rem; }
dl.figures dd { margin: 0; font-size: 1.15rem; font-weight: 600;
  font-variant-numeric: tabular-nums; overflow-wrap: anywhere; }
.scroll { overflow-x: auto; }
table { border-collapse: collapse; font-size: .92rem; }
caption { text-align: left; padding: .2rem 0 .4rem; color: var(--faint); }
th, td { padding: .3rem 1rem .3rem 0; text-align: left; vertical-align: top; }
th { border-bottom: 1.5px solid var(--ink); font-weight: 600; }
td { border-bottom: 1px solid var(--line); }
.right { text-align: right; font-variant-numeric: tabular-nums; }
nav { margin: 1rem 0 0; font-size: .92rem; } nav ul { display: flex; flex-wrap: wrap;
  gap: .2rem 1.1rem; list-style: none; margin: 0; padding: 0; }
a { color: inherit; }
.own td { white-space: nowrap; } .own td.long { white-space: normal; }
th.right { white-space: normal; vertical-align: bottom; } th { vertical-align: bottom; }
.long { min-width: 15rem; }
code, pre { font-family: ui-monospace, Menlo, Consolas, monospace; font-size: .88rem; }
code { overflow-wrap: anywhere; }
pre { background: var(--soft); border-radius: .5rem; padding: .7rem .9rem; overflow-x: auto; }
figure { margin: .8rem 0; } figure svg, img { max-width: 100%; height: auto; }
figcaption { color: var(--faint); font-size: .92rem; max-width: 44rem; }
footer { margin-top: 3rem; color: var(--faint); font-size: .9rem; }
@media (max-width: 34rem) { .long { min-width: 11.5rem; } body { padding: 1rem .9rem 3rem; } .headline { max-width: none; font-size: 1.35rem; }
  dl.figures { grid-template-columns: 1fr 1fr; } }
@media print { :root { --ink: #000; --faint: #444; --line: #bbb; --ground: #fff; --soft: #f2f2f2;
  --good: #0d5c3b; --warn: #9a3412; }
  body { max-width: none; padding: 0; font-size: 10pt; } .scroll { overflow: visible; }
  h2, h3 { break-after: avoid; } tr, figure, dl.figures div { break-inside: avoid; }
  thead { display: table-header-group; } pre { white-space: pre-wrap; }
  th, td { padding-top: .15rem; padding-bottom: .15rem; } nav { display: none; } a { color: inherit; text-decoration: none; } @page { margin: 18mm 16mm; } }
`.trim();
