/**
 * The style sheet of the static report. Kind and outcome colours differ in lightness as well as in hue, so that
 * they stay apart for colour-blind readers and on grey paper; text on background keeps a contrast of 4.5 or more
 * (WCAG 2.2, 1.4.3).
 */
export const STYLE = `
:root{--paper:#faf9f5;--card:#ffffff;--ink:#1c2630;--muted:#55616b;--rule:#d9d6cc;--grid:#e9e6dd;
--accepted:#2a7f86;--flagged:#d9962b;--unreadable:#5a5560;--galaxy:#c2531a;--quasar:#2458b8;--star:#8a3f86;
--galaxy-text:#a5430f;--quasar-text:#2458b8;--star-text:#7d3579;
--plot-data:#8b959d;--plot-band:rgba(0,119,107,.26);--plot-best:#00776b;--plot-runner-up:#9a6400;--plot-mask:rgba(120,110,80,.22);color-scheme:light}
@media (prefers-color-scheme:dark){@media screen{:root{--paper:#14191e;--card:#1b2229;--ink:#e6e4dd;--muted:#a5afb8;--rule:#343e48;--grid:#29323b;
--accepted:#4fa9b0;--flagged:#e5ab4a;--unreadable:#8d8795;--galaxy:#ee8a52;--quasar:#7ea6f0;--star:#cf86ca;
--galaxy-text:#ee8a52;--quasar-text:#8fb2f3;--star-text:#d795d2;
--plot-data:#8793a0;--plot-band:rgba(69,194,177,.30);--plot-best:#45c2b1;--plot-runner-up:#e6b450;--plot-mask:rgba(220,205,150,.13);color-scheme:dark}}}
*{box-sizing:border-box}
body{margin:0 auto;max-width:1240px;padding:28px 24px 60px;background:var(--paper);color:var(--ink);font:15px/1.5 system-ui,"Segoe UI","DejaVu Sans",sans-serif}
h1{font-size:34px;line-height:1.15;margin:0 0 8px;letter-spacing:-.01em;overflow-wrap:anywhere}
h2{font-size:21px;margin:44px 0 12px;padding-top:12px;border-top:2px solid var(--ink)}
h3{font-size:17px;margin:0;overflow-wrap:anywhere}
.program{margin:0 0 4px;color:var(--muted);font-size:14px}
.lead{font-size:18px;max-width:62em;margin:0 0 18px}
.tiles{display:grid;grid-template-columns:repeat(auto-fit,minmax(150px,1fr));gap:12px;list-style:none;margin:0;padding:0}
.tile{background:var(--card);border:1px solid var(--rule);border-top:5px solid var(--muted);border-radius:3px;padding:10px 14px}
.tile.accepted{border-top-color:var(--accepted)}.tile.flagged{border-top-color:var(--flagged)}.tile.unreadable{border-top-color:var(--unreadable)}
.tile strong{display:block;font-size:30px;line-height:1.2;font-variant-numeric:tabular-nums}
.tile-name{font-weight:600}.tile-meaning{display:block;color:var(--muted);font-size:13px}
.pair{display:grid;grid-template-columns:repeat(auto-fit,minmax(min(480px,100%),1fr));gap:26px;align-items:start}
table{border-collapse:collapse;width:100%}
caption{text-align:left;font-weight:600;padding-bottom:4px}
th,td{text-align:left;padding:4px 12px 4px 0;border-bottom:1px solid var(--rule);vertical-align:top;font-weight:400;overflow-wrap:anywhere}
thead th{color:var(--muted);font-size:13px;overflow-wrap:normal}
.number{text-align:right;font-variant-numeric:tabular-nums;white-space:nowrap}
.counts tbody th{min-width:8.5em}
svg.bar{width:120px;height:10px;display:inline-block}
.unseen{position:absolute;width:1px;height:1px;overflow:hidden;clip-path:inset(50%)}
.chart{margin:0;background:var(--card);border:1px solid var(--rule);border-radius:3px;padding:12px 14px 8px}
.chart figcaption{font-weight:600}
.chart svg:not(.swatch){width:100%;height:auto;display:block}
.chart text{font-size:12px;fill:var(--muted)}.chart .axis-title{fill:var(--ink)}
.grid{stroke:var(--grid)}.axis{stroke:var(--muted)}.whisker{stroke:var(--ink);stroke-width:1.5}
.legend{list-style:none;display:flex;gap:16px;margin:2px 0 0;padding:0;font-size:13px;color:var(--muted)}
.swatch{width:10px;height:10px;margin-right:5px}
.tone-accepted{fill:var(--accepted)}.tone-flagged{fill:var(--flagged)}.tone-unreadable{fill:var(--unreadable)}
.tone-galaxy{fill:var(--galaxy)}.tone-quasar{fill:var(--quasar)}.tone-star{fill:var(--star)}.soft{fill-opacity:.75}
.wide{margin-top:26px}
.reason{font:600 13px/1.4 ui-monospace,"DejaVu Sans Mono",monospace;background:var(--grid);padding:1px 6px;border-radius:3px;white-space:nowrap;overflow-wrap:normal}
.reasons thead th:first-child{width:11em}.reasons thead th:nth-child(3){width:6em}.reasons thead th:last-child{width:140px}
.note{color:var(--muted);max-width:62em}
#controls form{display:flex;flex-wrap:wrap;gap:10px 16px;align-items:end;background:var(--card);border:1px solid var(--rule);border-radius:3px;padding:12px 14px}
#controls label{display:flex;flex-direction:column;font-size:13px;color:var(--muted);gap:2px}
#controls label.box{flex-direction:row;align-items:center;gap:6px;padding-bottom:6px;color:var(--ink)}
#controls input,#controls select{font:inherit;font-size:14px;color:var(--ink);background:var(--paper);border:1px solid var(--muted);border-radius:3px;padding:4px 6px}
#controls input[type=text],#controls input[type=number]{width:6.5em}
#controls p{margin:8px 0;color:var(--muted)}
:focus-visible{outline:3px solid var(--quasar);outline-offset:2px}
.card{background:var(--card);border:1px solid var(--rule);border-left:5px solid var(--flagged);border-radius:3px;padding:14px 16px;margin:0 0 16px;content-visibility:auto;contain-intrinsic-size:auto 720px}
.card[hidden]{display:none}
.answer{font-weight:600;margin-left:.6em}
.tone-text-galaxy{color:var(--galaxy-text)}.tone-text-quasar{color:var(--quasar-text)}.tone-text-star{color:var(--star-text)}.tone-text-none{color:var(--muted)}
.place{margin:2px 0 6px;color:var(--muted);font-size:14px;overflow-wrap:anywhere}.place strong{color:var(--ink)}
code,pre{font:13px/1.4 ui-monospace,"DejaVu Sans Mono",monospace}pre{white-space:pre-wrap;overflow-wrap:anywhere;margin:4px 0}
.why{list-style:none;padding:0;margin:0 0 10px}.why li{margin:3px 0}
.body{display:grid;grid-template-columns:minmax(0,2.1fr) minmax(0,1fr);gap:22px}
.facts{font-size:13px}.facts dl{margin:0}
.facts dl div{display:grid;grid-template-columns:10.5em 1fr;gap:8px;border-bottom:1px solid var(--rule);padding:2px 0}
.facts dt{color:var(--muted)}.facts dd{margin:0;overflow-wrap:anywhere;font-variant-numeric:tabular-nums}
.small{font-size:12.5px;margin-top:12px}.small th,.small td{padding:2px 8px 2px 0}
.facts-table th{color:var(--muted);width:16em}
.no-plot{color:var(--muted);border:1px dashed var(--rule);padding:14px;margin:0}
.plot-tools{display:flex;flex-wrap:wrap;gap:4px 16px;font-size:13px;align-items:center;margin-bottom:4px}
.key::before{content:"";display:inline-block;width:18px;height:0;border-top:3px solid;margin-right:6px;vertical-align:middle}
.key-band::before{height:12px;border:0;background:var(--plot-band)}
.key-data::before{border-color:var(--plot-data)}.key-best::before{border-color:var(--plot-best)}
.key-runner-up::before{border-color:var(--plot-runner-up);border-top-style:dashed}
.key-lines::before{width:0;height:12px;border-top:0;border-left:2px solid var(--plot-best)}
.key-mask::before{height:12px;border:0;background:var(--plot-mask);outline:1px solid var(--rule)}
.key-galaxy::before{border-color:var(--galaxy)}.key-quasar::before{border-color:var(--quasar)}.key-star::before{border-color:var(--star)}
.key input{margin:0 2px 0 0;vertical-align:middle}.hint{color:var(--muted)}
.folded .body{display:none}.folded .card{margin-bottom:6px;padding:8px 14px;contain-intrinsic-size:auto 90px}
@media (max-width:900px){.body{grid-template-columns:1fr}}
@media print{*{print-color-adjust:exact}svg.bar{width:70px}body{max-width:none;padding:0;background:#fff;font-size:11px}.pair{grid-template-columns:1fr 1fr;gap:12px}h2{margin-top:22px}.tiles{grid-template-columns:repeat(6,1fr);gap:6px}.tile{padding:6px 8px}.tile strong{font-size:20px}.lead{font-size:14px}.card,.chart,tr{break-inside:avoid}.card{content-visibility:visible}#controls,.hint,noscript{display:none}h2{break-after:avoid}.body{grid-template-columns:1fr}.plots{zoom:.82}.facts dl{columns:2}}
`;
