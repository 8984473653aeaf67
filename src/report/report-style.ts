/** The report's style sheet: light, the system's own fonts, one page width of A4 on screen and in print. */
export const reportStyle = `
:root { color-scheme: light; --ink: #1a2229; --dim: #5a6772; --line: #d6dce1; --faint: #f3f5f7; --glow: #a35f00; }
* { box-sizing: border-box; }
html { background: #fff; color: var(--ink); font: 14px/1.5 system-ui, "Segoe UI", "Helvetica Neue", "Liberation Sans", Arial, sans-serif; font-variant-numeric: tabular-nums; -webkit-print-color-adjust: exact; print-color-adjust: exact; }
body { max-width: 860px; margin: 0 auto; padding: 40px 32px 56px; }
.definitions { position: absolute; }
h1 { font-size: 25px; line-height: 1.28; font-weight: 600; letter-spacing: -0.01em; margin: 2px 0 10px; text-wrap: balance; overflow-wrap: anywhere; }
h2 { font-size: 15px; font-weight: 600; margin: 34px 0 10px; padding-top: 10px; border-top: 1px solid var(--line); break-after: avoid; }
h3 { font-size: 13px; font-weight: 600; margin: 18px 0 4px; break-after: avoid; }
p { margin: 0 0 8px; max-width: 68ch; }
.over { color: var(--dim); margin: 0; overflow-wrap: anywhere; }
.dim, .note { color: var(--dim); fill: var(--dim); }
.note { font-size: 12.5px; }
.facts { max-width: none; color: var(--dim); display: flex; flex-wrap: wrap; gap: 0 22px; }
.facts .amount { color: var(--glow); font-weight: 600; }
a { color: inherit; text-decoration-color: #9aa4ad; text-underline-offset: 2px; }
.ledger-bar { display: block; width: 100%; margin: 18px 0 14px; }
.ledger-bar text { fill: var(--ink); font-family: inherit; }
.swatch { width: 24px; height: 16px; vertical-align: -3px; margin-right: 9px; }
table { border-collapse: collapse; width: 100%; margin: 6px 0 10px; font-size: 13px; }
th { text-align: left; font-weight: 400; color: var(--dim); border-bottom: 1px solid var(--line); padding: 3px 14px 3px 0; vertical-align: bottom; }
td { border-bottom: 1px solid #eaeef1; padding: 3px 14px 3px 0; vertical-align: top; }
th.n, td.n { text-align: right; white-space: nowrap; }
th:last-child, td:last-child { padding-right: 0; }
tr { break-inside: avoid; }
table.tray { table-layout: fixed; }
.tray td { padding-top: 8px; padding-bottom: 8px; }
.tray .ledger-bar { margin: 2px 0 0; }
.tray .rank { width: 4%; } .tray .name { width: 16%; } .tray .booked { width: 34%; } .tray .wide { width: 15%; }
.tray td.name { overflow-wrap: anywhere; }
tfoot td { border-bottom: 0; font-weight: 600; }
tr.none td { color: var(--dim); }
dl { display: grid; grid-template-columns: minmax(120px, 22%) 1fr; gap: 3px 18px; margin: 6px 0 10px; }
dt { color: var(--dim); }
dd { margin: 0; overflow-wrap: anywhere; }
.figures { display: grid; grid-template-columns: 1fr 1fr; gap: 24px 28px; margin-top: 12px; }
figure { margin: 0; break-inside: avoid; }
figcaption { font-size: 12.5px; color: var(--dim); margin-top: 6px; }
figcaption b { color: var(--ink); font-weight: 600; }
.frame { max-width: 100%; }
.frame img { display: block; width: 100%; outline: 1px solid var(--line); }
.few img { image-rendering: pixelated; }
.bar { border-top: 3px solid var(--ink); margin-top: 7px; font-size: 12px; line-height: 1.3; padding-top: 2px; white-space: nowrap; }
.scale { display: block; width: 100%; margin-top: 6px; }
.scale text { font-size: 11.5px; fill: var(--ink); font-family: inherit; }
.keys { display: flex; flex-wrap: wrap; gap: 4px 16px; margin-top: 8px; font-size: 12px; }
.keys .swatch { margin-right: 6px; }
ul, ol { margin: 6px 0 10px; padding-left: 20px; }
li { margin: 3px 0; max-width: 72ch; }
code, pre { font: 12px/1.5 ui-monospace, "SFMono-Regular", Consolas, "Liberation Mono", monospace; }
code { overflow-wrap: anywhere; }
pre { background: var(--faint); padding: 10px 12px; margin: 8px 0; white-space: pre-wrap; overflow-wrap: anywhere; }
summary { cursor: pointer; color: var(--dim); }
.changed { font-weight: 600; color: var(--glow); }
footer { margin-top: 34px; padding-top: 10px; border-top: 1px solid var(--line); color: var(--dim); font-size: 12px; }
@page { size: A4; margin: 15mm 14mm; }
@media print { html { font-size: 12.5px; } body { max-width: none; padding: 0; } h1 { font-size: 21px; } h2 { margin-top: 22px; } p { orphans: 3; widows: 3; } }
@media (max-width: 620px) { body { padding: 20px 16px; } .figures { grid-template-columns: 1fr; } }
`;
