/** The style of the printed report: the sheet on screen, on white. */
export const reportStyle = `
@page { size: auto; margin: 18mm 16mm 20mm; @bottom-right { content: counter(page) " / " counter(pages); font: 9px sans-serif; } }
:root { --ink: #1b2326; --soft: #4f5b60; --rule: #d8d4ca; --doubt: #7a4a00; }
* { box-sizing: border-box; }
body { margin: 0 auto; padding: 24px; max-width: 760px; color: var(--ink); background: #fff; font: 13px/1.45 system-ui, -apple-system, "Segoe UI", Roboto, "Noto Sans", "DejaVu Sans", sans-serif; font-variant-numeric: tabular-nums lining-nums; }
h1 { font-size: 22px; margin: 0 0 4px; }
h2 { font-size: 16px; margin: 28px 0 8px; padding-top: 10px; border-top: 1px solid var(--rule); break-after: avoid; }
h3 { font-size: 13px; margin: 16px 0 4px; break-after: avoid; }
p { margin: 4px 0; }
.soft { color: var(--soft); }
.small { font-size: 11px; }
.invented { margin: 8px 0; padding: 6px 10px; color: var(--doubt); border: 1px solid #d9a441; background: #fdf1da; }
.answer { font-size: 26px; font-weight: 600; line-height: 1.25; margin: 2px 0 0; }
.interval { font-size: 16px; color: var(--soft); margin: 0 0 8px; }
table { border-collapse: collapse; width: 100%; margin: 6px 0 10px; font-size: 12px; break-inside: auto; }
thead { display: table-header-group; }
tr { break-inside: avoid; }
th, td { text-align: left; font-weight: 400; padding: 3px 10px 3px 0; border-bottom: 1px solid var(--rule); vertical-align: baseline; }
thead th { color: var(--soft); border-bottom-color: #a9a598; vertical-align: bottom; }
.number { text-align: right; white-space: nowrap; }
.interval-cell { white-space: nowrap; color: var(--soft); }
td svg { vertical-align: middle; }
.keep { break-inside: avoid; }
.hash { font-family: ui-monospace, monospace; font-size: 8.5px; overflow-wrap: anywhere; }
.aliquot { break-inside: auto; }
.figure { display: block; width: 100%; height: auto; margin: 6px 0; break-inside: avoid; }
.figure text { font: 10.5px system-ui, "Noto Sans", "DejaVu Sans", sans-serif; }
.figure .tick, .figure .title { fill: #4f5b60; }
.figure .label { font-weight: 600; paint-order: stroke; stroke: #fff; stroke-width: 3px; }
.figure .grid { stroke: #e6e3db; } .figure .axis { stroke: #a9a598; }
.figure .fitted { fill: none; stroke: #1b2326; stroke-width: 1; }
.figure .point { fill: #fff; stroke: #1b2326; stroke-width: 0.7; } .figure .out { stroke: #9aa3a7; }
.figure rect.out { fill: #ece9e2; stroke: none; } .figure .band { fill: #dfe2e3; }
.figure .doubt-mark { stroke: #7a4a00; stroke-width: 3; } .figure .doubt-number { fill: #7a4a00; font-weight: 600; }
.doubts { margin: 6px 0; padding-left: 22px; } .doubts li { margin: 4px 0; break-inside: avoid; } .doubts strong { color: var(--doubt); }
.cautions { border-left: 3px solid #d9a441; padding-left: 12px; break-inside: avoid; }
@media print { body { padding: 0; max-width: none; } }
`;
