/** The style of the printed report: the sheet on screen, on white. */
export const reportStyle = `
:root { --ink: #1b2326; --soft: #4f5b60; --rule: #d8d4ca; --rule-strong: #a9a598; --doubt: #7a4a00; --refuse: #9b1c1c; }
* { box-sizing: border-box; }
body { margin: 0 auto; padding: 28px 24px 48px; max-width: 760px; color: var(--ink); background: #fff; font: 13px/1.45 system-ui, -apple-system, "Segoe UI", Roboto, "Noto Sans", "DejaVu Sans", sans-serif; font-variant-numeric: tabular-nums lining-nums; overflow-wrap: break-word; }
h1 { font-size: 22px; line-height: 1.25; margin: 0 0 4px; }
h2 { font-size: 16px; margin: 28px 0 8px; padding-top: 10px; border-top: 1px solid var(--rule); break-after: avoid; }
h3 { font-size: 13px; margin: 16px 0 4px; break-after: avoid; }
h4 { font-size: 12px; margin: 10px 0 2px; break-after: avoid; }
p { margin: 4px 0; orphans: 3; widows: 3; }
.soft { color: var(--soft); }
.small { font-size: 11px; }
.invented { margin: 8px 0; padding: 6px 10px; color: var(--doubt); border: 1px solid #d9a441; background: #fdf1da; }
.refused { margin: 8px 0; padding: 6px 10px; color: var(--refuse); border: 1px solid currentColor; background: #fbe9e7; }
.answer { font-size: 26px; font-weight: 700; line-height: 1.25; margin: 2px 0 0; }
.interval { font-size: 16px; color: var(--soft); margin: 0 0 6px; }
.summary { margin-top: 16px; }
.summary strong { font-size: 18px; line-height: 1.3; }
.line { white-space: nowrap; }
table { border-collapse: collapse; width: 100%; margin: 6px 0 10px; font-size: 12px; }
thead { display: table-header-group; }
tr { break-inside: avoid; }
th, td { text-align: left; font-weight: 400; padding: 3px 10px 3px 0; border-bottom: 1px solid var(--rule); vertical-align: baseline; }
th:last-child, td:last-child { padding-right: 0; }
thead th { color: var(--soft); border-bottom-color: var(--rule-strong); vertical-align: bottom; }
td em { color: var(--doubt); font-style: normal; }
.number { text-align: right; white-space: nowrap; }
thead .number { white-space: normal; }
.interval-cell { white-space: nowrap; color: var(--soft); }
.species { display: block; position: relative; padding-left: 27px; }
.glyph { position: absolute; left: 0; top: -2px; }
.glyph svg { display: block; }
.keep { break-inside: avoid; }
.hash { font-family: ui-monospace, "DejaVu Sans Mono", monospace; font-size: 8.5px; }
.aliquot + .aliquot { border-top: 1px solid var(--rule); margin-top: 20px; }
.figure { display: block; width: 100%; height: auto; margin: 6px 0; break-inside: avoid; }
.figure text { font: 10.5px system-ui, -apple-system, "Segoe UI", Roboto, "Noto Sans", "DejaVu Sans", sans-serif; }
.figure .tick, .figure .title { fill: #4f5b60; }
.figure .label { font-weight: 700; paint-order: stroke; stroke: #fff; stroke-width: 3px; }
.figure .grid { stroke: #e6e3db; } .figure .axis { stroke: #a9a598; }
.figure .measured, .figure .residual { fill: none; stroke: #1b2326; stroke-width: 1.1; }
.figure .measured { stroke-width: 1.5; }
.figure .point { fill: #fff; stroke: #1b2326; stroke-width: 0.8; }
.figure .measured.out, .figure .point.out { stroke: #8b9599; }
.figure rect.out { fill: #f4f2ec; } .figure .hatch { fill: none; stroke: #a9a598; stroke-width: 0.7; }
.figure .on-fill { fill: none; stroke: #fff; stroke-width: 1; stroke-opacity: 0.6; }
.figure .window-edge { stroke: #6b767b; stroke-dasharray: 1 3; }
.figure .band { fill: #dfe2e3; } .figure .beyond { fill: #7a4a00; }
.figure .doubt-mark { stroke: #7a4a00; stroke-width: 3; } .figure .doubt-number { fill: #7a4a00; font-weight: 700; }
.doubts { margin: 2px 0 8px; padding-left: 22px; } .doubts li { margin: 4px 0; break-inside: avoid; } .doubts li::marker, .doubts strong { color: var(--doubt); font-weight: 700; }
.cautions { border-left: 3px solid #d9a441; padding-left: 12px; break-inside: avoid; }
@media print {
  body { padding: 0; max-width: none; }
  .invented, .refused, rect, path { print-color-adjust: exact; -webkit-print-color-adjust: exact; }
  .new-page { break-before: page; } .new-page > h2 { margin-top: 0; border-top: 0; padding-top: 0; }
  .aliquot + .aliquot { break-before: page; border-top: 0; margin-top: 0; }
}
`;
